const FIRST_WAIT_SEC = 60;
const LONGEST_WAIT_SEC = 3600;
/** Share of a wait by which it is longer or shorter, so that what failed together does not come back together. */
const SCATTER = 0.2;

/** How long to wait after some failed attempts before this one: from a minute, doubling up to about an hour, in ms. */
export function waitMs(failedBefore: number, random: () => number): number {
  const waitSec = Math.min(LONGEST_WAIT_SEC, FIRST_WAIT_SEC * 2 ** Math.min(failedBefore, 10));
  return waitSec * 1000 * (1 + SCATTER * (2 * random() - 1));
}
