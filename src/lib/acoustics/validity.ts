/** The contract's nine interval flags and their bits, as masks, in the order in which they are listed. */
const CONTRACT_FLAGS = {
  overload: 1 << 0,
  underrange: 1 << 1,
  calibration: 1 << 2,
  selfcheck: 1 << 3,
  rain: 1 << 4,
  wind: 1 << 5,
  tamper: 1 << 6,
  powerloss: 1 << 7,
  clockset: 1 << 8,
} as const;

/** Every stored flag as its mask: the contract's nine, and `laeqComputed` (bit 15), which only Bittern sets. */
export const FLAGS = { ...CONTRACT_FLAGS, laeqComputed: 1 << 15 } as const;

/** A flag that monitors send and answers show. */
export type FlagName = keyof typeof CONTRACT_FLAGS;

/** The contract's nine flags in fixed order. */
export const FLAG_NAMES = Object.keys(CONTRACT_FLAGS) as FlagName[];

/**
 * Why an interval is left out of statistics, in the order in which reasons are told. Stored as bits by their places: add new ones at
 * the end.
 */
export const INVALIDITY_REASONS = [
  'calibration',
  'selfcheck',
  'overload',
  'tamper',
  'powerloss',
  'clockset',
  'wind',
  'wind-speed',
  'rain',
  'exclusion',
  'mast-wind',
  'mast-rain',
] as const;
export type InvalidityReason = (typeof INVALIDITY_REASONS)[number];

/** A network's settings that decide which intervals count. */
export interface ValidityRules {
  /** An interval with a wind speed above this (m/s) is left out; 5 m/s is common practice. */
  maximumWindSpeedMs: number;
  /** Whether intervals flagged `rain` are left out. */
  excludeRain: boolean;
}

/** Weather that a shared mast tells of an interval. */
export interface MastWeather {
  windSpeedMs: number;
  isRaining: boolean;
}

/** What validity is judged by. */
export interface JudgedInterval {
  flags: number;
  /** The station's own sensor's. */
  windSpeedMs: number | null;
  /** Of the mast assigned to the station, where it has no wind speed of its own: its own sensor is believed before any other. */
  mast?: MastWeather | null;
}

const ALWAYS_INVALID =
  FLAGS.calibration |
  FLAGS.selfcheck |
  FLAGS.overload |
  FLAGS.tamper |
  FLAGS.powerloss |
  FLAGS.clockset |
  FLAGS.wind;

/** The contract's flags in a stored mask, in fixed order; `laeqComputed` is not among them. */
export function flagNames(mask: number): FlagName[] {
  return FLAG_NAMES.filter((name) => (mask & CONTRACT_FLAGS[name]) !== 0);
}

/** Whether a text is one of the contract's flags. */
export function isFlagName(text: string): text is FlagName {
  return Object.hasOwn(CONTRACT_FLAGS, text);
}

/** The mask of some flags. */
export function flagMask(names: readonly FlagName[]): number {
  return names.reduce((mask, name) => mask | CONTRACT_FLAGS[name], 0);
}

function holds(
  reason: InvalidityReason,
  interval: JudgedInterval,
  rules: ValidityRules,
  excluded: boolean,
): boolean {
  if (reason === 'exclusion') return excluded;
  if (reason === 'wind-speed') {
    return interval.windSpeedMs !== null && interval.windSpeedMs > rules.maximumWindSpeedMs;
  }
  if (reason === 'mast-wind') return isMastWindy(interval, rules);
  if (reason === 'mast-rain') return isMastRainy(interval, rules);
  if (reason === 'rain' && !rules.excludeRain) return false;
  return (interval.flags & CONTRACT_FLAGS[reason]) !== 0;
}

/**
 * Why an interval is left out of statistics, in the order of `INVALIDITY_REASONS`; empty when it counts. `excluded` says
 * that an operator's exclusion covers it. `underrange` is never a reason. The interval's data stay whatever this says.
 */
export function invalidityReasons(
  interval: JudgedInterval,
  rules: ValidityRules,
  excluded: boolean,
): InvalidityReason[] {
  return INVALIDITY_REASONS.filter((reason) => holds(reason, interval, rules, excluded));
}

/** Whether an interval counts in statistics: the same answer as no `invalidityReasons`, without making a list. */
export function isValid(interval: JudgedInterval, rules: ValidityRules, excluded: boolean): boolean {
  return (
    !excluded &&
    (interval.flags & ALWAYS_INVALID) === 0 &&
    !(rules.excludeRain && (interval.flags & FLAGS.rain) !== 0) &&
    !(interval.windSpeedMs !== null && interval.windSpeedMs > rules.maximumWindSpeedMs) &&
    !isMastWindy(interval, rules) &&
    !isMastRainy(interval, rules)
  );
}

function isMastWindy({ windSpeedMs, mast }: JudgedInterval, { maximumWindSpeedMs }: ValidityRules): boolean {
  return windSpeedMs === null && !!mast && mast.windSpeedMs > maximumWindSpeedMs;
}

function isMastRainy({ windSpeedMs, mast }: JudgedInterval, { excludeRain }: ValidityRules): boolean {
  return excludeRain && windSpeedMs === null && !!mast && mast.isRaining;
}
