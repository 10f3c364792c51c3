import {
  adjustmentProblem,
  MAXIMUM_ADJUSTMENT_DB,
  type Adjustment,
  type AdjustmentKind,
} from '#lib/acoustics/ratingLevel';

const ADJUSTMENT_KINDS: readonly AdjustmentKind[] = ['tonal', 'impulsive', 'intermittent', 'other'];

/** Adjustments and background as a person entered them; they live in the address, so that the page can be sent on. */
export interface RatingEntry {
  adjustments: Adjustment[];
  /** Background LA90 in dB measured at another time; null: the period's own. */
  backgroundDb: number | null;
  values: Record<string, string>;
  problems: Record<string, string>;
}

/** Name of a kind's field for the reason. */
const reasonField = (kind: AdjustmentKind) => `${kind}Reason`;

const NUMBER = /^[+-]?\d{1,3}(?:[.,]\d{1,2})?$/;
const LONGEST_REASON = 300;
const LOUDEST_BACKGROUND_DB = 140;

/** Reads the entry from an address; what is wrong stays in `values` and is not reckoned with. */
export function readRatingEntry(query: URLSearchParams): RatingEntry {
  const entry: RatingEntry = { adjustments: [], backgroundDb: null, values: {}, problems: {} };
  for (const kind of ADJUSTMENT_KINDS) readAdjustment(kind, query, entry);
  const text = (query.get('background') ?? '').trim();
  entry.values['background'] = text;
  if (text === '') return entry;
  const levelDb = numberOf(text);
  if (levelDb === null || levelDb < 0 || levelDb > LOUDEST_BACKGROUND_DB) {
    entry.problems['background'] =
      `Give a level in dB between 0 and ${LOUDEST_BACKGROUND_DB}, or leave it empty.`;
  } else {
    entry.backgroundDb = levelDb;
  }
  return entry;
}

function readAdjustment(kind: AdjustmentKind, query: URLSearchParams, entry: RatingEntry): void {
  const text = (query.get(kind) ?? '').trim();
  const reason = (query.get(reasonField(kind)) ?? '').trim().slice(0, LONGEST_REASON);
  entry.values[kind] = text;
  entry.values[reasonField(kind)] = reason;
  if (text === '' || Number(text) === 0) return;
  const adjustmentDb = numberOf(text);
  if (adjustmentDb === null) {
    entry.problems[kind] = `Give a number of dB between 0 and ${MAXIMUM_ADJUSTMENT_DB[kind]}.`;
    return;
  }
  const adjustment = { kind, adjustmentDb, reason };
  const problem = adjustmentProblem(adjustment);
  if (problem === null) entry.adjustments.push(adjustment);
  else entry.problems[reason === '' && isInRange(kind, adjustmentDb) ? reasonField(kind) : kind] = problem;
}

function isInRange(kind: AdjustmentKind, adjustmentDb: number): boolean {
  return adjustmentDb >= 0 && adjustmentDb <= MAXIMUM_ADJUSTMENT_DB[kind];
}

function numberOf(text: string): number | null {
  return NUMBER.test(text) ? Number(text.replace(',', '.')) : null;
}
