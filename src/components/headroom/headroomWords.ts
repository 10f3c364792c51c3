import { parseInstant } from '#lib/contracts/instants';
import type { LimitHeadroom } from '#lib/contracts/headroom';
import { formatDuration } from '#lib/format/durations';
import { formatLevelDb } from '#lib/format/levels';
import { formatClock } from '#lib/format/times';

/** "62.7" of a headroom in dB: rounded down, so that what is told does not pass the limit. */
function formatHeadroomDb(headroomDb: number): string {
  return formatLevelDb(Math.floor(headroomDb * 10 + 1e-9) / 10);
}

/** "45 s" of seconds that still can be measured: those that are awaited and those that are left. */
export function restWords({ seconds }: LimitHeadroom): string {
  return formatDuration(seconds.awaited + seconds.left);
}

/** What the rest of the window may be, in words. */
export function verdictWords(item: LimitHeadroom): string {
  const { state, headroom, limit } = item;
  if (state === 'passed') return 'Passed: a moment was above the limit';
  if (state === 'not-foretold') return 'Not foretold for this limit: its windows are judged as they end';
  if (state === 'not-compared') return 'Not compared: its coverage cannot become enough';
  if (state === 'dismissed') return 'Not compared: its wind dismisses it, however calm the rest is';
  if (limit.metric === 'LAFmax' && headroom !== null) return `No moment above ${formatLevelDb(headroom)} dB`;
  if (state === 'certain') {
    return item.seconds.needed > 0
      ? `Certain to pass once another ${formatDuration(item.seconds.needed)} are measured, however quiet`
      : 'Certain to pass, however quiet the rest is';
  }
  if (headroom === null) return 'Nothing is left of it';
  return `Up to ${formatHeadroomDb(headroom)} dB on average for ${restWords(item)}`;
}

/** What is taken of the rest's wind, of a limit that goes by it; null where nothing is, or nothing is foretold. */
export function assumptionWords({ windWords, state }: LimitHeadroom): string | null {
  if (windWords === null || state === 'dismissed' || state === 'not-foretold') return null;
  return `If all of the rest has the wind that this limit goes by: ${windWords}`;
}

/** "22:00–06:00" of the window. */
export function windowWords({ from, to }: LimitHeadroom, zone: string): string {
  return `${clockOf(from, zone)}–${clockOf(to, zone)}`;
}

/** What was measured of the window: "7 h 12 min; 3 min missing, 1 min awaited". */
export function measuredWords({ seconds: { valid, missing, awaited } }: LimitHeadroom): string {
  if (valid === 0) return 'no data so far';
  const less = [
    missing > 0 && `${formatDuration(missing)} missing`,
    awaited > 0 && `${formatDuration(awaited)} awaited`,
  ].filter((part) => part !== false);
  return [`${formatDuration(valid)} measured`, ...less].join(', ');
}

/** Where it is heading: "56.3 dB if the rest is like the last 15 min"; null where that is not known. */
export function headingWords({ heading }: LimitHeadroom): string | null {
  if (heading === null) return null;
  const like = heading.from === 'last-15-min' ? 'the last 15 min' : 'so far';
  return `${formatLevelDb(heading.level)} dB if the rest is like ${like}`;
}

/** When it could be passed at the earliest; null where the usual is not known or the window is settled. */
export function earliestWords({ usualHigh, earliestPassing }: LimitHeadroom, zone: string): string | null {
  if (usualHigh === null) return null;
  const loud = `at the loudest usual level, ${formatLevelDb(usualHigh)} dB`;
  return earliestPassing === null
    ? `Not to be passed ${loud}`
    : `Could be certain to pass at ${clockOf(earliestPassing, zone)} ${loud}`;
}

/** Whether a person should look: it will pass, or is heading above the limit. */
export function isPressing({ state, heading, limit }: LimitHeadroom): boolean {
  return (
    state === 'passed' || state === 'certain' || (heading !== null && heading.level >= limit.threshold + 0.05)
  );
}

function clockOf(instant: string, zone: string): string {
  return formatClock(parseInstant(instant) ?? NaN, zone);
}
