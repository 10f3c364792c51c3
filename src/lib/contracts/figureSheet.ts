import type { BandFraction } from '../acoustics/bands';
import type { PeriodKind } from '../acoustics/dayEveningNight';
import type { DayFigures, Seconds } from './levels';

/** How much of a figure's own time has valid data; it travels with every figure. */
export interface Covered {
  /** 0–1. */
  coverage: number;
  meetsMinimum: boolean;
}

/** One figure of a period, with how it is made, or why there is none. */
export interface FigureRow extends Covered {
  /** Stable: "LAeq", "LA10", "NR". */
  key: string;
  /** For people; a descriptor in it is typeset. */
  name: string;
  /** Unrounded; null where the data do not allow it. */
  value: number | null;
  unit: string;
  decimals: 0 | 1;
  /** A difference is shown with its sign. */
  isDifference: boolean;
  /** Definition and source. */
  convention: string;
  /** What else must be known to read the value. */
  note: string | null;
  /** Why there is no value; null where there is one. */
  missing: string | null;
}

/** The same figure with and without what validity rules and exclusions leave out. */
export interface ComparedFigure {
  key: string;
  name: string;
  unit: string;
  validDb: number | null;
  rawDb: number | null;
  /** Valid minus raw; null where either is missing. */
  differenceDb: number | null;
}

export interface Comparison {
  figures: ComparedFigure[];
  rawSec: number;
}

/** Time of a reason for which intervals are left out; an interval may have several reasons. */
export interface LeftOut {
  reason: string;
  intervals: number;
  sec: number;
}

/** What reading every interval of the period tells. */
export interface IntervalFacts {
  counted: number;
  leftOut: number;
  reasons: LeftOut[];
  /** Seconds of counted intervals flagged underrange, and of those whose LAeq was computed from their bands. */
  underrangeSec: number;
  computedSec: number;
}

/** Figures of one band. Levels unweighted, dB. */
export interface BandRow extends Covered {
  nominalHz: number;
  label: string;
  Leq: number | null;
  L10: number | null;
  L50: number | null;
  L90: number | null;
  /** Highest Leq of one base interval. */
  highest: number | null;
  /** Leq with the A-weighting of the exact mid-band frequency. */
  aLeq: number | null;
  /** Part of the A-weighted energy of all bands, 0–1. */
  aShare: number | null;
}

export interface Distribution {
  /** Share of valid time (0–1) in classes of 1 dB, `fromDb <= L < fromDb + 1`, ascending without holes. */
  classes: { fromDb: number; share: number }[];
  /** Share of valid time (0–1) that exceeds a level, falling. */
  cumulative: { levelDb: number; exceededShare: number }[];
  marks: { percent: number; levelDb: number }[];
}

/** Pooled levels of some time. */
export interface PooledRow extends Covered {
  label: string;
  LAeq: number | null;
  LA10: number | null;
  LA50: number | null;
  LA90: number | null;
  LAFmax: number | null;
  seconds: Seconds;
}

/** One hour of the clock on the wall. */
export interface HourCell extends Covered {
  date: string;
  hour: number;
  /** 1 for the second of two hours of that name, which the autumn change brings; else 0. */
  turn: 0 | 1;
  from: string;
  to: string;
  LAeq: number | null;
}

/** A date of the heat map. */
export interface HourRow {
  date: string;
  cells: HourCell[];
  /** Hours that the spring change leaves out on this date. */
  skippedHours: number[];
}

/** Leq of each band in each hour of the clock on the wall, all dates of the period together; unweighted, dB. */
export interface BandHours {
  bandFraction: BandFraction;
  /** Nominal mid-bands, ascending; of the levels beside them. */
  bandsHz: number[];
  octavesHz: number[];
  /** 24, from midnight. */
  hours: (Covered & { hour: number; bandsLeq: (number | null)[]; octavesLeq: (number | null)[] })[];
}

/** A local date's figures, whole, and those that are only worked out here. */
export interface DateRow extends DayFigures {
  /** Arithmetic mean of 18 hourly LA10, 06–24; null where one is missing. */
  L10of18h: number | null;
  /** Only where the network's periods are those of CNEL. */
  CNEL: number | null;
}

/** Levels of the days, evenings and nights of the period, and Lden of them. */
export interface PooledPeriodsOfDay {
  rows: (PooledRow & { kind: PeriodKind })[];
  Lden: number | null;
  /** Why there is no Lden; null where there is one. */
  missing: string | null;
}

export interface ToneSentence {
  method: 'survey' | 'adjacent-pair' | 'averaged-neighbours';
  words: string;
}

export interface Tonality {
  /** Why the mean spectrum says nothing about tones; null where it was assessed. */
  notAssessable: string | null;
  tones: ToneSentence[];
  /** Other bands that stand out of the mean spectrum, in words. */
  standingOut: string[];
  /** Tones of single blocks of at least 60 s by the survey method: share of the assessed time per band. */
  blocks: { assessedSec: number; bands: { label: string; share: number }[] } | null;
}

/** A fact of the head, in words. */
export interface Fact {
  name: string;
  words: string;
}

/** Everything that the page of a period's figures shows, and its JSON. */
export interface FigureSheet extends Covered {
  network: string;
  station: { code: string; name: string };
  /** Of the bands in this period. */
  bandFraction: BandFraction;
  from: string;
  to: string;
  timeZone: string;
  seconds: Seconds;
  minimumCoverage: number;
  sampleSeconds: number | null;
  head: Fact[];
  /** Null where the period holds more intervals than are read one by one. */
  intervals: IntervalFacts | null;
  /** Why there are no such facts, no raw figures and no tones block by block; null where there are. */
  intervalsMissing: string | null;
  exclusions: { from: string; to: string; reason: string }[];
  levels: FigureRow[];
  /** How levels exceeded N % of the time are made. */
  exceedanceConvention: string;
  assessments: FigureRow[];
  tonality: Tonality;
  comparison: Comparison | null;
  dates: DateRow[];
  hasCnel: boolean;
  byClock: PooledPeriodsOfDay;
  byDate: PooledPeriodsOfDay | null;
  bands: BandRow[];
  octaves: BandRow[];
  distribution: Distribution | null;
  heatMap: HourRow[];
  bandHours: BandHours;
  byHour: PooledRow[];
  byWeekday: PooledRow[];
  cautions: string[];
}
