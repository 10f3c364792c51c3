import type { NetworkRow } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import type { Note } from '#ingest/health/mail';
import { config } from '#lib/config/index';
import { parseInstant } from '#lib/contracts/common';
import type { LimitHeadroom } from '#lib/contracts/headroom';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage, formatLevelDb } from '#lib/format/levels';
import { formatClock, formatPeriod, formatZone } from '#lib/format/times';

interface Place {
  network: NetworkRow;
  station: StationRow;
  timeZone: string;
}

/** An early warning in words: what the rest may be, where it is heading, and what comes next. */
export function warningNote(item: LimitHeadroom, { network, station, timeZone }: Place): Note {
  const { limit, level, seconds } = item;
  const window = { fromSec: parseInstant(item.from) ?? 0, toSec: parseInstant(item.to) ?? 0 };
  const end = formatClock(window.toSec, timeZone);
  const isCertain = item.state === 'certain';
  const base = `${config().origin}/n/${network.slug}`;
  const passedSec = window.toSec - window.fromSec - seconds.left;
  return {
    subject: `${station.code} ${station.name}: ${isCertain ? 'will pass' : 'heading above'} the limit by ${end}`,
    opening: [restWords(item), headingWords(item), windWords(item)].filter(Boolean).join(' '),
    facts: [
      ['Limit', `${limit.name}: ${limit.descriptor} above ${formatLevelDb(limit.threshold)} dB`],
      ['Period', `${formatPeriod(window, timeZone)}, ${formatZone(timeZone, window)}`],
      ['So far', level === null ? 'no level' : `${formatLevelDb(level)} dB`],
      [
        'Coverage',
        `${formatCoverage(seconds.valid / passedSec)} of the ${formatDuration(passedSec)} that have passed`,
      ],
    ],
    link: { label: 'Headroom now', url: `${base}/stations/${station.code}` },
    closing:
      `One such message is sent a window, and none when it is over: if the limit was passed, that is told as an exceedance. ` +
      `You get this because you chose early warnings: ${base}/alerts`,
  };
}

/** Rounded down, so that what is told does not pass the limit. */
function restWords({ state, headroom, seconds, limit }: LimitHeadroom): string {
  const rest = formatDuration(seconds.awaited + seconds.left);
  if (state === 'certain' || headroom === null) {
    return `The window ends above the limit of ${formatLevelDb(limit.threshold)} dB even if the remaining ${rest} are silent.`;
  }
  const most = formatLevelDb(Math.floor(headroom * 10 + 1e-9) / 10);
  return `The remaining ${rest} of the window may be at most ${most} dB on average.`;
}

function windWords({ windWords }: LimitHeadroom): string {
  return windWords === null
    ? ''
    : `All of the rest is taken to have the wind that the limit goes by: ${windWords}.`;
}

function headingWords({ heading }: LimitHeadroom): string {
  if (heading === null) return '';
  const like = heading.from === 'last-15-min' ? 'goes on like the last 15 minutes' : 'goes on like so far';
  return `It is heading for ${formatLevelDb(heading.level)} dB if it ${like}.`;
}
