import { toTenths } from './rounding';

/** A level that working-life rules act on. */
export interface ActionValue {
  key: 'lower-action' | 'upper-action' | 'limit' | 'niosh';
  quantity: 'LAeq' | 'LCpeak';
  /** dB(A) over 8 h for LAeq, dB(C) for LCpeak. */
  levelDb: number;
  source: string;
}

const EU_SOURCE = 'Directive 2003/10/EC Article 3';

/**
 * Occupational action and limit values, lowest first of each quantity. They hold at a worker's ear over a shift (the limit
 * value: under hearing protectors), not for a place: reaching one is a reason to say that hearing-protection rules may apply.
 */
export const ACTION_VALUES: readonly ActionValue[] = [
  { key: 'lower-action', quantity: 'LAeq', levelDb: 80, source: EU_SOURCE },
  { key: 'upper-action', quantity: 'LAeq', levelDb: 85, source: EU_SOURCE },
  { key: 'niosh', quantity: 'LAeq', levelDb: 85, source: 'NIOSH recommended exposure limit' },
  { key: 'limit', quantity: 'LAeq', levelDb: 87, source: EU_SOURCE },
  { key: 'lower-action', quantity: 'LCpeak', levelDb: 135, source: EU_SOURCE },
  { key: 'upper-action', quantity: 'LCpeak', levelDb: 137, source: EU_SOURCE },
  { key: 'limit', quantity: 'LCpeak', levelDb: 140, source: EU_SOURCE },
];

/**
 * The occupational values that a period's LAeq or LCpeak reaches (compared in tenths, reaching counts). LAeq is compared
 * as it is, whatever the period's length: as if somebody stayed there for 8 h. Empty means no caution.
 */
export function actionValuesReached(levels: {
  laeqDb: number | null;
  lcpeakDb: number | null;
}): ActionValue[] {
  return ACTION_VALUES.filter(({ quantity, levelDb }) => {
    const measuredDb = quantity === 'LAeq' ? levels.laeqDb : levels.lcpeakDb;
    return measuredDb !== null && toTenths(measuredDb) >= toTenths(levelDb);
  });
}

/** Hours in which a constant level in dB(A) uses up NIOSH's recommended daily limit: 8/2^((L − 85)/3). */
export function nioshHours(levelDb: number): number {
  return 8 / 2 ** ((levelDb - 85) / 3);
}
