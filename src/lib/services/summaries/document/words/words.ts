import { type InvalidityReason } from '#lib/acoustics/validity';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type Compliance, type DocumentTonality } from '#lib/contracts/monthEvidence';
import { type UncertaintyTerms } from '#lib/contracts/monthFigures';
import { type Cause } from '#lib/contracts/exceedances';
import { type SummarySection, type SummaryTemplate } from '#lib/contracts/summaryTemplate';
import { GERMAN } from './de';
import { ENGLISH } from './en';

export type Language = SummaryTemplate['language'];

/** Headings of the parts that always stand. */
export type StandingSection = 'stations' | 'method' | 'cautions' | 'sign-off' | 'seal';

/** Headings of columns. */
export type ColumnWord =
  | 'station'
  | 'date'
  | 'figure'
  | 'over'
  | 'level'
  | 'coverage'
  | 'limit'
  | 'compared'
  | 'from'
  | 'to'
  | 'version'
  | 'inForce'
  | 'state'
  | 'cause'
  | 'windows'
  | 'exceedances'
  | 'highest'
  | 'band'
  | 'reason'
  | 'duration'
  | 'withRules'
  | 'everything'
  | 'difference'
  | 'instrument'
  | 'checkedAt'
  | 'calibrator'
  | 'found'
  | 'drift'
  | 'source'
  | 'meanSpeed'
  | 'maximumSpeed'
  | 'direction'
  | 'term'
  | 'meaning'
  | 'quarters';

/** Everything that a month’s document says in words, in one language. */
export interface MonthWords {
  language: Language;
  /** Of the document’s language, BCP 47. */
  tag: string;
  decimal: '.' | ',';
  sections: Record<SummarySection | StandingSection, string>;
  columns: Record<ColumnWord, string>;
  monthName: (month: string) => string;
  title: (month: string) => string;
  draft: string;
  revision: (number: number) => string;
  toDate: string;
  issued: (name: string, at: string) => string;
  computed: (at: string) => string;
  notOver: string;
  page: (page: number, pages: number) => string;
  contents: string;
  over: Record<'days' | 'evenings' | 'nights' | 'pooled' | 'month', string>;
  ofSamples: (seconds: number) => string;
  maximumAt: (at: string) => string;
  belowMinimum: string;
  complaints: (counts: MonthDocument['complaints']) => string;
  measuredBy: string;
  noInstrument: string;
  bandsAre: (fraction: 1 | 3, seconds: number) => string;
  microphone: (metres: number) => string;
  placements: Record<'free-field' | 'facade', string>;
  correction: (db: string) => string;
  stands: (from: string | null, to: string | null, coverage: string | null) => string | null;
  noData: string;
  none: Record<'limits' | 'exceedances' | 'exclusions' | 'calibrations' | 'weather' | 'leftOut', string>;
  more: (count: number) => string;
  compliance: Record<Compliance['state'], string>;
  /** What a limit compares, as the document names it. */
  limitText: (text: string) => string;
  lifted: (count: number) => string;
  exceedanceStates: Record<'standing' | 'lifted', string>;
  causes: Record<Cause, string>;
  noCause: string;
  reasons: Record<InvalidityReason, string>;
  ownSensor: string;
  mast: (code: string, name: string) => string;
  captions: {
    days: string;
    heatMap: string;
    bands: (coverage: string) => string;
    spectrogram: string;
    effect: string;
    yearToDate: (from: string, to: string) => string;
  };
  axes: Record<'hour' | 'date' | 'frequency' | 'noLevel', string>;
  alternatives: {
    heatMap: (station: string, low: string, high: string) => string;
    bands: (station: string) => string;
    spectrogram: (station: string) => string;
    trend: (station: string) => string;
  };
  tonality: {
    notAssessable: Record<NonNullable<DocumentTonality['notAssessable']>, string>;
    none: string;
    tone: (range: string, excess: string, method: 'survey' | 'adjacent-pair') => string;
    blocks: (tonal: number, assessed: number) => string;
    lowFrequency: (difference: string, bound: string, isAbove: boolean) => string;
    lowFrequencyBlocks: (above: number, assessed: number) => string;
    noLowFrequency: string;
  };
  uncertainty: (terms: UncertaintyTerms, format: (db: number) => string) => string;
  method: (doc: MonthDocument, format: MethodFormat) => string[];
  cautions: readonly string[];
  glossary: readonly (readonly [term: string, meaning: string])[];
  signOff: Record<'prepared' | 'reviewed' | 'issued', string>;
  seal: Record<'digest' | 'year' | 'software' | 'key' | 'chain' | 'verify', string>;
}

/** How the method statement writes what it names. */
export interface MethodFormat {
  instant: (instant: string) => string;
  coverage: (coverage: number) => string;
  /** Sentence about a clock change in the month; null without one. */
  clockChange: { at: string; hours: number } | null;
}

/** The words of a language. */
export function wordsOf(language: Language): MonthWords {
  return language === 'de' ? GERMAN : ENGLISH;
}
