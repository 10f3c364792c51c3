import { formatAgo, formatDuration } from '#lib/format/durations';
import { descriptorText } from '#lib/format/descriptors';
import { formatCoverage, formatLevelDb } from '#lib/format/levels';
import { formatClock } from '#lib/format/times';
import { secondsOf, stateWords } from '../../stations/stateWords';
import { type PastQuarter, type ShownStation } from './shownStation';

/** What a station's mark says by its shape. */
export type MarkState = ShownStation['state'] | 'over-limit';

/** A live station with a standing exceedance of the last hour, or of the moment shown, is over its limit; a silent one is silent first. */
export function markStateOf({ state, overLimit }: ShownStation): MarkState {
  return state === 'live' && overLimit ? 'over-limit' : state;
}

/** The averaging time of a station's current level: "1 min". */
export function averagingOf({ latest, intervalSeconds }: ShownStation): string {
  return formatDuration(latest?.seconds ?? intervalSeconds);
}

/** What a station is doing or, of a past quarter-hour, how much of it the level stands on. */
export function stateLine(station: ShownStation, zone: string, nowSec: number): string {
  const { past, latest } = station;
  if (!past) return stateWords(station, zone, nowSec);
  if (!past.isKnown) return 'being fetched';
  const words = latest ? pastWords(past) : 'no valid data then';
  return station.retiredAt ? `${words}; retired since` : words;
}

/** The words on a slip that has no level. */
export function absenceWords({ past, state }: ShownStation): string {
  if (past) return past.isKnown ? 'no data' : '…';
  return state === 'silent' ? 'silent' : 'no post yet';
}

/** The small line of a slip after the station's code: what the level is of or, of a past quarter-hour, its coverage. */
export function slipNote(station: ShownStation): string {
  return station.past ? formatCoverage(station.past.coverage) : averagingOf(station);
}

/** "3 exceedances in the period", or nothing where these are not shown or there are none. */
export function exceedanceWords({ exceedances }: ShownStation): string | null {
  if (!exceedances) return null;
  return `${exceedances} ${exceedances === 1 ? 'exceedance' : 'exceedances'} in the period`;
}

/** A station and how it is, or was, doing, in a sentence: "Quay Head, MER-01: LAeq,1 min 64.2 dB, over a limit, 40 s ago." */
export function stationSentence(station: ShownStation, zone: string, nowSec: number): string {
  const { latest, past } = station;
  const name = `${station.name}, ${station.code}`;
  const counted = exceedanceWords(station);
  const end = counted === null ? '.' : `; ${counted}.`;
  if (station.state !== 'live' || !latest) return `${name}: ${stateLine(station, zone, nowSec)}${end}`;
  const level = `${descriptorText('LAeq', averagingOf(station))} ${formatLevelDb(latest.LAeq)} dB`;
  const limit = station.overLimit ? ', over a limit' : '';
  const when = past
    ? `${formatClock(past.fromSec, zone)} to ${formatClock(past.toSec, zone)}, ${pastWords(past)}`
    : formatAgo(secondsOf(latest.start) + latest.seconds, nowSec);
  return `${name}: ${level}${limit}, ${when}${end}`;
}

function pastWords({ coverage, meetsMinimum }: PastQuarter): string {
  return `${formatCoverage(coverage)} valid${meetsMinimum ? '' : ', not enough to compare'}`;
}
