import { BAND_SLOTS } from './bands';
import {
  DAY_MINUTES,
  FIRST_GROUP_SLOT,
  GROUP_THIRDS,
  NO_GROUP,
  NO_LEVEL_CENTI_DB,
  OUTLINE_GROUPS,
  STEPS_A_DB,
  type DayTrace,
} from './dayTrace';
import { MINIMUM_SHARED_THIRDS } from './likeness';

/** The spectrum that is looked for and how alike a minute must be. */
export interface ShapeQuery {
  /** By `bandSlot`, dB; null = not compared. */
  levelsDb: readonly (number | null)[];
  /** LAeq of the spectrum. */
  laeqDb: number | null;
  /** Largest RMS difference that is alike, dB. */
  mostRmsDb: number;
  /** Largest difference of LAeq; null: however loud. */
  withinDb: number | null;
}

/** Whether a minute of a day is asked for. */
export type IsWanted = (minute: number) => boolean;

/** A minute that is alike. */
export interface ShapeMatch {
  minute: number;
  rmsDb: number;
  laeqCentiDb: number;
}

/** Rounding an outline's group to whole steps moves its mean by at most half of one. */
const GROUP_ERROR_DB = 0.5 / STEPS_A_DB;
/** Of sums of squares, in floating point. */
const ROUNDING = 1e-6;

/** Compares the minutes of day traces with one spectrum. */
export class ShapeSearch {
  readonly #slots: number[];
  readonly #query: Float64Array;
  /** Groups of which the query has every third, and their means in steps. */
  readonly #groups: Uint8Array;
  readonly #groupSteps: Float64Array;

  constructor(private readonly asked: ShapeQuery) {
    this.#query = Float64Array.from(
      { length: BAND_SLOTS },
      (_, slot) => (asked.levelsDb[slot] ?? 0) * STEPS_A_DB,
    );
    this.#slots = [...this.#query.keys()].filter((slot) => (asked.levelsDb[slot] ?? null) !== null);
    const groups = groupsOf(asked.levelsDb);
    this.#groups = Uint8Array.from(groups, ({ group }) => group);
    this.#groupSteps = Float64Array.from(groups, ({ steps }) => steps);
  }

  /**
   * Whether any minute of an outline may be alike. The spread between groups alone is part of the whole spread, so that no minute
   * that `matches` finds is ever ruled out.
   */
  mayMatch(outline: Uint8Array): boolean {
    const mostSpread = this.#mostGroupSpread();
    for (let at = 0; at < outline.length; at += OUTLINE_GROUPS) {
      if (outline[at] !== 0 && this.#groupSpread(outline, at) <= mostSpread) return true;
    }
    return false;
  }

  /** Squared steps between the groups that a minute and the query have whole, about their mean. */
  #groupSpread(outline: Uint8Array, at: number): number {
    let sum = 0;
    let squares = 0;
    let count = 0;
    for (let one = 0; one < this.#groups.length; one += 1) {
      const step = outline[at + (this.#groups[one] ?? 0)] ?? NO_GROUP;
      if (step === NO_GROUP) continue;
      const difference = step - (this.#groupSteps[one] ?? 0);
      sum += difference;
      squares += difference * difference;
      count += 1;
    }
    return count === 0 ? 0 : squares - (sum * sum) / count;
  }

  /** Squared steps between groups beyond which the whole spectrum cannot be alike. */
  #mostGroupSpread(): number {
    const spread = this.asked.mostRmsDb * Math.sqrt(this.#slots.length / GROUP_THIRDS);
    return ((spread + GROUP_ERROR_DB * Math.sqrt(OUTLINE_GROUPS)) * STEPS_A_DB) ** 2;
  }

  /** Minutes of a day that are alike, ascending; `isWanted` leaves out minutes that are not asked for, null none. */
  matches(trace: DayTrace, isWanted: IsWanted | null): ShapeMatch[] {
    const found: ShapeMatch[] = [];
    this.eachMatch(trace, isWanted, (match) => found.push({ ...match }));
    return found;
  }

  /** The same, told one after the other in one object that is filled again: a year of stations has millions. */
  eachMatch(trace: DayTrace, isWanted: IsWanted | null, tell: (match: Readonly<ShapeMatch>) => void): void {
    const { firstSlot, slots } = trace;
    const compared = this.#slots.filter((slot) => firstSlot <= slot && slot < firstSlot + slots);
    if (compared.length < MINIMUM_SHARED_THIRDS) return;
    const offsets = Int32Array.from(compared, (slot) => slot - firstSlot);
    const querySteps = Float64Array.from(compared, (slot) => this.#query[slot] ?? 0);
    const mostSquares = compared.length * (this.asked.mostRmsDb * STEPS_A_DB) ** 2;
    const match: ShapeMatch = { minute: 0, rmsDb: 0, laeqCentiDb: 0 };
    for (let minute = 0; minute < DAY_MINUTES; minute += 1) {
      const laeqCentiDb = trace.laeqCentiDb[minute] ?? NO_LEVEL_CENTI_DB;
      if (!this.#isLevel(laeqCentiDb) || (isWanted !== null && !isWanted(minute))) continue;
      const rmsDb = rmsOf(trace.steps, minute * slots, { offsets, querySteps, mostSquares });
      if (rmsDb > this.asked.mostRmsDb) continue;
      match.minute = minute;
      match.rmsDb = rmsDb;
      match.laeqCentiDb = laeqCentiDb;
      tell(match);
    }
  }

  #isLevel(laeqCentiDb: number): boolean {
    if (laeqCentiDb === NO_LEVEL_CENTI_DB) return false;
    const { withinDb, laeqDb } = this.asked;
    return withinDb === null || laeqDb === null || Math.abs(laeqCentiDb / 100 - laeqDb) <= withinDb;
  }
}

/** The query beside the bands of a trace. */
interface Beside {
  offsets: Int32Array;
  querySteps: Float64Array;
  /** Sum of squares about the mean beyond which no minute is alike. */
  mostSquares: number;
}

/** Bands after which a minute that is too far already is given up: the squares about the mean only grow. */
const LOOK_EVERY = 8;

/** RMS difference in dB about its mean; Infinity where too few thirds are shared or it is surely too large. */
function rmsOf(steps: Uint8Array, from: number, { offsets, querySteps, mostSquares }: Beside): number {
  let sum = 0;
  let squares = 0;
  let count = 0;
  for (let at = 0; at < offsets.length; at += 1) {
    const step = steps[from + (offsets[at] ?? 0)] ?? 0;
    if (step === 0) continue;
    const difference = step - (querySteps[at] ?? 0);
    sum += difference;
    squares += difference * difference;
    count += 1;
    if (count % LOOK_EVERY === 0 && squares - (sum * sum) / count > mostSquares + ROUNDING) return Infinity;
  }
  if (count < MINIMUM_SHARED_THIRDS) return Infinity;
  const mean = sum / count;
  return Math.sqrt(Math.max(0, squares / count - mean * mean)) / STEPS_A_DB;
}

/** Groups of the outline of which the query has every third, with their means in steps. */
function groupsOf(levelsDb: readonly (number | null)[]): { group: number; steps: number }[] {
  return Array.from({ length: OUTLINE_GROUPS }, (_, group) => group).flatMap((group) => {
    const first = FIRST_GROUP_SLOT + group * GROUP_THIRDS;
    const known = levelsDb.slice(first, first + GROUP_THIRDS).filter((levelDb) => levelDb !== null);
    if (known.length < GROUP_THIRDS) return [];
    return [{ group, steps: (known.reduce((sum, levelDb) => sum + levelDb, 0) / GROUP_THIRDS) * STEPS_A_DB }];
  });
}
