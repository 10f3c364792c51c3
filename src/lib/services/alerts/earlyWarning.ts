import { toTenths } from '#lib/acoustics/rounding';
import { parseInstant } from '#lib/contracts/common';
import type { LimitHeadroom } from '#lib/contracts/headroom';

/** A level of less says little of where the window is heading. */
const LEAST_VALID_SEC = 300;
/** Share of the window that must have passed. */
const LEAST_PASSED = 0.25;
/** With less left of it, the message of the exceedance itself comes as soon. */
const LEAST_LEFT_SEC = 300;

/**
 * Whether a window that is open is worth a warning: certain to pass, or heading above its limit as limits are compared, strictly
 * greater on tenths rounded half up; after a quarter of it and 5 min of data, with 5 min left.
 */
export function isWorthWarning(item: LimitHeadroom): boolean {
  const { state, heading, limit, seconds } = item;
  const windowSec = (parseInstant(item.to) ?? 0) - (parseInstant(item.from) ?? 0);
  const isEarly = seconds.valid < LEAST_VALID_SEC || windowSec - seconds.left < LEAST_PASSED * windowSec;
  if (isEarly || seconds.left < LEAST_LEFT_SEC) return false;
  if (state === 'certain') return true;
  return state === 'open' && heading !== null && toTenths(heading.level) > toTenths(limit.threshold);
}
