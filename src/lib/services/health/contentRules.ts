import { FINE, UNKNOWN, type IntervalEvidence, type Rule } from './evidence';

/** Once found, a battery is not well before it is this much above its bound. */
const BATTERY_MARGIN_V = 0.2;
/** Half of the readings, and so many of them, make it more than a slip. */
const LEAST_READINGS = 5;
const BATTERY_LOOK_SEC = 3600;
const LEAST_FROZEN_INTERVALS = 4;
const LEAST_COMPARABLE = 5;
const INCONSISTENT_SHARE = 0.5;
const LEAST_WIND_READINGS = 30;
/** Of the stretch, from the first reading on: a sensor that has just come is not stuck. */
const LEAST_WIND_SHARE = 0.95;

/** The battery is below its bound: the median of the last hour, so that one reading under load is none. */
export const batteryRule: Rule = ({ thresholds, intervals }, openSinceSec) => {
  const endSec = endOf(intervals.at(-1));
  const read = intervals.flatMap(({ startSec, batteryV }) =>
    batteryV === null || startSec < endSec - BATTERY_LOOK_SEC ? [] : [{ startSec, batteryV }],
  );
  const measured = medianOf(read.map(({ batteryV }) => batteryV));
  if (measured === null) return openSinceSec === null ? FINE : UNKNOWN;
  const bound = thresholds.leastBattery;
  if (measured >= (openSinceSec === null ? bound : bound + BATTERY_MARGIN_V)) return FINE;
  if (openSinceSec === null && read.length < Math.min(LEAST_READINGS, intervals.length)) return UNKNOWN;
  const sinceSec = read.find(({ batteryV }) => batteryV < bound)?.startSec ?? endSec;
  return { state: 'bad', sinceSec, measured, bound };
};

/** The very same levels, band by band, for longer than the bound: no noise is so steady. A calibrator is. */
export const frozenRule: Rule = ({ thresholds, intervals }) => {
  const heard = intervals.filter(({ isCheck }) => !isCheck);
  const newest = heard.at(-1);
  if (!newest) return UNKNOWN;
  const differing = heard.findLastIndex(({ fingerprint }) => fingerprint !== newest.fingerprint);
  const run = heard.slice(differing + 1);
  const boundSec = thresholds.frozenForMinutes * 60;
  const lengthSec = run.reduce((sum, { durationSec }) => sum + durationSec, 0);
  if (run.length < LEAST_FROZEN_INTERVALS || lengthSec < boundSec) return FINE;
  return {
    state: 'bad',
    sinceSec: run[0]?.startSec ?? newest.startSec,
    measured: lengthSec,
    bound: boundSec,
  };
};

/** LAeq and bands tell different levels in more than half of the newest intervals. */
export const bandsRule: Rule = ({ intervals }, openSinceSec) => {
  const compared = intervals.filter(({ isInconsistent, isCheck }) => isInconsistent !== null && !isCheck);
  if (compared.length < LEAST_COMPARABLE) return openSinceSec === null ? FINE : UNKNOWN;
  const apart = compared.filter(({ isInconsistent }) => isInconsistent);
  const share = apart.length / compared.length;
  if (share <= INCONSISTENT_SHARE) return FINE;
  return { state: 'bad', sinceSec: apart[0]?.startSec ?? 0, measured: share, bound: INCONSISTENT_SHARE };
};

/** The quiet of the last day is far from the usual one: a microphone that hears nothing, or hums. */
export const floorRule: Rule = ({ nowSec, thresholds, floorDb: { lastDay, usual } }, openSinceSec) => {
  if (lastDay === null || usual === null) return openSinceSec === null ? FINE : UNKNOWN;
  const shiftDb = lastDay - usual;
  const bound = thresholds.floorShift;
  if (Math.abs(shiftDb) <= (openSinceSec === null ? bound : 0.8 * bound)) return FINE;
  return { state: 'bad', sinceSec: nowSec, measured: shiftDb, bound };
};

/** The very same wind speed for longer than the bound. A calm of exactly nothing happens: it has to last four times as long. */
export const windRule: Rule = ({ newestEndSec, thresholds, wind }, openSinceSec) => {
  const { count, firstSec, leastMs, mostMs } = wind;
  if (count < LEAST_WIND_READINGS || firstSec === null || leastMs === null || newestEndSec === null) {
    return openSinceSec === null ? FINE : UNKNOWN;
  }
  if (leastMs !== mostMs) return FINE;
  const boundSec = windStretchSec(thresholds.windStuckForHours, leastMs);
  if (newestEndSec - firstSec < LEAST_WIND_SHARE * boundSec) return openSinceSec === null ? FINE : UNKNOWN;
  return { state: 'bad', sinceSec: firstSec, measured: leastMs, bound: boundSec };
};

const CALM_TIMES = 4;

/** How long a wind speed has to stay the very same, in seconds. */
export function windStretchSec(hours: number, speedMs: number): number {
  return hours * 3600 * (speedMs === 0 ? CALM_TIMES : 1);
}

export function medianOf(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const ordered = values.toSorted((a, b) => a - b);
  const middle = Math.floor(ordered.length / 2);
  const [low, high] = [ordered[middle - 1] ?? 0, ordered[middle] ?? 0];
  return ordered.length % 2 === 1 ? high : (low + high) / 2;
}

const endOf = (interval: IntervalEvidence | undefined) =>
  interval ? interval.startSec + interval.durationSec : 0;
