import { FLAG_NAMES, FLAGS } from '#lib/acoustics/validity';
import { FINE, type IntervalEvidence, type Rule } from './evidence';

/** Share of the newest hour from which a flag is no passing one; once found, it is over below half of it. */
const OFTEN_SHARE = 0.1;
const LEAST_FLAGGED = 3;

/** Flags that are not expected at this station come often. `measured` holds them as bits. */
export const flagsRule: Rule = ({ intervals, expectedFlags }, openSinceSec) => {
  const least = openSinceSec === null ? OFTEN_SHARE : OFTEN_SHARE / 2;
  const allSec = lengthSec(intervals);
  const often = FLAG_NAMES.map((name) => FLAGS[name])
    .filter((flag) => (expectedFlags & flag) === 0)
    .map((flag) => ({ flag, bearing: intervals.filter(({ flags }) => (flags & flag) !== 0) }))
    .filter(
      ({ bearing }) =>
        bearing.length >= Math.min(LEAST_FLAGGED, intervals.length) &&
        bearing.length > 0 &&
        lengthSec(bearing) >= least * allSec,
    );
  if (often.length === 0) return FINE;
  return {
    state: 'bad',
    sinceSec: Math.min(...often.map(({ bearing }) => bearing[0]?.startSec ?? Infinity)),
    measured: often.reduce((mask, { flag }) => mask | flag, 0),
    bound: OFTEN_SHARE,
  };
};

const lengthSec = (intervals: readonly IntervalEvidence[]) =>
  intervals.reduce((sum, { durationSec }) => sum + durationSec, 0);
