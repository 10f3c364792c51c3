import type { LimitHeadroom } from '#lib/contracts/headroom';
import type { LimitWindow } from '#lib/services/limits/windows';

/** How an open window's seconds divide. */
export interface WindowSeconds {
  /** Where the rest of the window begins: its data may still come. Epoch seconds. */
  restFromSec: number;
  told: LimitHeadroom['seconds'];
}

/** What of a window is known. */
export interface Known {
  nowSec: number;
  /** End of the station's newest interval, not after now; null without any. */
  newestSec: number | null;
  validSec: number;
  /** As `minimumFor` has it. */
  minimumCoverage: number | null;
}

/**
 * Divides an open window: what was measured, what is missing before the newest data, what is awaited since (a monitor that
 * cannot reach us keeps its data and sends them later, so nothing of it is lost yet), and what is left.
 */
export function secondsOf(
  { startSec, endSec }: LimitWindow,
  { nowSec, newestSec, validSec, minimumCoverage }: Known,
): WindowSeconds {
  const restFromSec = Math.max(startSec, newestSec ?? startSec);
  const neededSec = (minimumCoverage ?? 0) * (endSec - startSec) - validSec;
  return {
    restFromSec,
    told: {
      valid: validSec,
      missing: Math.max(0, restFromSec - startSec - validSec),
      awaited: nowSec - restFromSec,
      left: endSec - nowSec,
      // The slack of the judge's comparison: 0.7 of an hour is 2520 s, not 2521.
      needed: Math.max(0, Math.ceil(neededSec - 1e-6)),
    },
  };
}
