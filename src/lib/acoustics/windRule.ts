import { toTenths } from './rounding';

/** Which wind the intervals of a limit must have to count, and which wind dismisses a window. Null: no bound. */
export interface WindRule {
  /** Mean wind speed of an interval, m/s: both bounds belong to the range. */
  minimumMs: number | null;
  maximumMs: number | null;
  /** Where the wind comes from, degrees: clockwise from `fromDeg` to `toDeg`, both included, across north too. Both or none. */
  fromDeg: number | null;
  toDeg: number | null;
  /** A window whose mean wind speed is above this, to tenths of a m/s, is not compared. */
  dismissAboveMs: number | null;
  /** What becomes of intervals whose wind is not known, and of windows of which too little is known. */
  unknown: 'left-out' | 'counts';
}

/** Wind of an interval; null: not known. */
export interface KnownWind {
  speedMs: number | null;
  directionDeg: number | null;
}

export type WindPlace = 'within' | 'outside' | 'unknown';

/** A window's wind is known where the intervals with a wind speed make up at least this share of what was measured. */
const LEAST_KNOWN_SHARE = 0.5;

/** Whether a wind lies within the range and sector of a rule. What is outside by its speed is outside, whatever its direction. */
export function windPlace(rule: WindRule, { speedMs, directionDeg }: KnownWind): WindPlace {
  const { minimumMs, maximumMs, fromDeg, toDeg } = rule;
  const [asksSpeed, asksDirection] = [minimumMs !== null || maximumMs !== null, fromDeg !== null];
  if (asksSpeed && speedMs !== null && (speedMs < (minimumMs ?? 0) || speedMs > (maximumMs ?? Infinity)))
    return 'outside';
  if (fromDeg !== null && directionDeg !== null && !isInSector(directionDeg, fromDeg, toDeg ?? fromDeg))
    return 'outside';
  return (asksSpeed && speedMs === null) || (asksDirection && directionDeg === null) ? 'unknown' : 'within';
}

/** Whether an interval of this wind counts for a limit with the rule. */
export function countsInWind(rule: WindRule, wind: KnownWind): boolean {
  const place = windPlace(rule, wind);
  return place === 'within' || (place === 'unknown' && rule.unknown === 'counts');
}

/** Clockwise from one direction to another, both included; 350 to 10 goes across north. */
function isInSector(directionDeg: number, fromDeg: number, toDeg: number): boolean {
  const width = (toDeg - fromDeg + 360) % 360;
  return (directionDeg - fromDeg + 720) % 360 <= width;
}

/** Wind of a window's measured intervals, whether they count or not; seconds. */
export interface WindowWind {
  measuredSec: number;
  knownSec: number;
  /** Wind speed times seconds, over those that are known, m. */
  metres: number;
  withinSec: number;
  outsideSec: number;
  unknownSec: number;
}

/** No wind at all. */
export function noWind(): WindowWind {
  return { measuredSec: 0, knownSec: 0, metres: 0, withinSec: 0, outsideSec: 0, unknownSec: 0 };
}

/** Adds some seconds of a wind to a window's. */
export function addWind(to: WindowWind, rule: WindRule, wind: KnownWind, seconds: number): void {
  to.measuredSec += seconds;
  to[PLACE_SECONDS[windPlace(rule, wind)]] += seconds;
  if (wind.speedMs === null) return;
  to.knownSec += seconds;
  to.metres += wind.speedMs * seconds;
}

const PLACE_SECONDS = { within: 'withinSec', outside: 'outsideSec', unknown: 'unknownSec' } as const;

/** Adds the wind of another part of the window. */
export function mergeWind(to: WindowWind, other: WindowWind): void {
  for (const field of Object.keys(to) as (keyof WindowWind)[]) to[field] += other[field];
}

/** Mean wind speed over what is known, m/s; null where nothing is. */
export function meanSpeedMs({ metres, knownSec }: WindowWind): number | null {
  return knownSec === 0 ? null : metres / knownSec;
}

/**
 * Whether a window is sure to be dismissed by its wind so far: even if all of its rest is measured, with the calmest wind that counts
 * for the rule.
 */
export function isSureToBeDismissed(rule: WindRule, soFar: WindowWind, restSec: number): boolean {
  if (soFar.measuredSec === 0) return false;
  return isDismissed(rule, {
    ...soFar,
    measuredSec: soFar.measuredSec + restSec,
    knownSec: soFar.knownSec + restSec,
    metres: soFar.metres + (rule.minimumMs ?? 0) * restSec,
  });
}

/**
 * Whether the wind of a window dismisses it, so that it is not compared: by its mean speed, rounded half up to tenths; where too little
 * is known, as the rule says of what is unknown.
 */
export function isDismissed(rule: WindRule, wind: WindowWind): boolean {
  if (rule.dismissAboveMs === null || wind.measuredSec === 0) return false;
  const mean = meanSpeedMs(wind);
  if (mean === null || wind.knownSec < LEAST_KNOWN_SHARE * wind.measuredSec)
    return rule.unknown === 'left-out';
  return toTenths(mean) > toTenths(rule.dismissAboveMs);
}
