import { FINE, UNKNOWN, waitSec, type Rule } from './evidence';

/** Once found, a share is not well before it is this much above its bound: it would else come and go. */
const COVERAGE_MARGIN = 0.02;

/**
 * No post for longer than the bound. Over once data newer than its beginning have come: a file of old data that somebody
 * uploads does not end a silence.
 */
export const silentRule: Rule = (evidence, openSinceSec) => {
  const { nowSec, intervalSec, thresholds, newestEndSec, lastPostSec } = evidence;
  if (newestEndSec === null || lastPostSec === null) return FINE;
  const allowedSec = waitSec(thresholds.silentAfterMinutes, intervalSec);
  const isStale = nowSec - newestEndSec > allowedSec;
  const hasPosted = nowSec - lastPostSec <= allowedSec;
  const isStillOpen = openSinceSec !== null && newestEndSec <= openSinceSec;
  if (!isStale || (hasPosted && !isStillOpen)) return FINE;
  return { state: 'bad', sinceSec: newestEndSec, measured: nowSec - newestEndSec, bound: allowedSec };
};

/** Posts come, but even the newest data are older than the bound. */
export const lateRule: Rule = (evidence) => {
  const { nowSec, intervalSec, thresholds, newestEndSec } = evidence;
  if (newestEndSec === null) return FINE;
  const boundSec = waitSec(thresholds.lateAfterMinutes, intervalSec);
  const lateSec = nowSec - newestEndSec;
  if (lateSec <= boundSec) return FINE;
  return { state: 'bad', sinceSec: newestEndSec + boundSec, measured: lateSec, bound: boundSec };
};

/** Less of the last 24 hours was received than the bound. */
export const coverageRule: Rule = ({ nowSec, thresholds, received24h }, openSinceSec) => {
  if (received24h === null) return UNKNOWN;
  const { leastCoverage } = thresholds;
  const enough = openSinceSec === null ? leastCoverage : Math.min(1, leastCoverage + COVERAGE_MARGIN);
  if (received24h >= enough) return FINE;
  return { state: 'bad', sinceSec: nowSec, measured: received24h, bound: leastCoverage };
};

/**
 * The monitor's clock is off: by the time that it sends, or by records that end in the future. One slow post is the network's
 * fault, not the clock's, so the smaller of the last two counts.
 */
export const clockRule: Rule = (evidence, openSinceSec) => {
  const { nowSec, thresholds, clockAheadSec, refusedAheadCount, intervals } = evidence;
  const bound = thresholds.mostClockOffSeconds;
  const allowed = openSinceSec === null ? bound : bound / 2;
  const byData = Math.max(
    0,
    ...intervals.map(({ startSec, durationSec, receivedAtSec }) => startSec + durationSec - receivedAtSec),
  );
  const measured =
    clockAheadSec !== null && Math.abs(clockAheadSec) >= byData ? clockAheadSec : byData > 0 ? byData : null;
  const isOff = (measured !== null && Math.abs(measured) > allowed) || refusedAheadCount > 0;
  if (!isOff) return measured === null && openSinceSec !== null && intervals.length === 0 ? UNKNOWN : FINE;
  return { state: 'bad', sinceSec: nowSec, measured, bound };
};
