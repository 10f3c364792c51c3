/** A check as the rule sees it, by when it was made (epoch seconds). */
export interface CheckedState {
  id: number;
  atSec: number;
  /** Whether the drift that it found, before any adjustment, is within the bound. */
  isGoodBefore: boolean;
  /** Whether the instrument went on good: what it showed last is within the bound. */
  isGoodAfter: boolean;
}

/** A stretch of an instrument's time whose data are doubtful. Half-open, epoch seconds. */
export interface DoubtfulStretch {
  /** The check that made it doubtful. */
  calibrationId: number;
  /** 0: since the instrument came, for no check before it was good. */
  fromSec: number;
  /** Null: until a good check. */
  toSec: number | null;
}

/**
 * Stretches of an instrument that a drift above the bound makes doubtful, of checks in order of time: all since the last good
 * check before it, and, where it was left as it was, all until the next good one.
 */
export function doubtfulStretches(checks: readonly CheckedState[]): DoubtfulStretch[] {
  const stretches: DoubtfulStretch[] = [];
  let previous: CheckedState | null = null;
  for (const check of checks) {
    const span = { fromSec: previous?.atSec ?? 0, toSec: check.atSec };
    if (!check.isGoodBefore) stretches.push({ calibrationId: check.id, ...span });
    else if (previous && !previous.isGoodAfter) stretches.push({ calibrationId: previous.id, ...span });
    previous = check;
  }
  if (previous && !previous.isGoodAfter) {
    stretches.push({ calibrationId: previous.id, fromSec: previous.atSec, toSec: null });
  }
  return stretches.filter(({ fromSec, toSec }) => toSec === null || toSec > fromSec);
}

/** What two half-open stretches share, or null; a null end is open. */
export function sharedSpan(
  one: { fromSec: number; toSec: number | null },
  other: { fromSec: number; toSec: number | null },
): { fromSec: number; toSec: number | null } | null {
  const fromSec = Math.max(one.fromSec, other.fromSec);
  const ends = [one.toSec, other.toSec].filter((end) => end !== null);
  const toSec = ends.length === 0 ? null : Math.min(...ends);
  return toSec === null || toSec > fromSec ? { fromSec, toSec } : null;
}
