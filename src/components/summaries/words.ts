import type { MonthState } from '#lib/contracts/summaries';
import type { SummaryMetric, SummarySection } from '#lib/contracts/summaryTemplate';

export const STATE_WORDS: Record<MonthState, string> = {
  open: 'not over',
  closed: 'not drafted',
  draft: 'draft',
  review: 'in review',
  issuing: 'being issued',
  issued: 'issued',
};

export const SECTION_WORDS: Record<SummarySection, string> = {
  limits: 'Limits in force',
  compliance: 'Compliance',
  exceedances: 'Exceedances',
  'year-to-date': 'Year to date',
  days: 'Day by day',
  'heat-map': 'Hours by day',
  bands: 'Bands',
  octaves: 'Octaves',
  spectrogram: 'Spectrogram',
  tonality: 'Tones and low frequencies',
  exclusions: 'Exclusions and their effect',
  calibrations: 'Calibrations and instruments',
  weather: 'Weather',
  complaints: 'Complaints, counted',
  glossary: 'Glossary',
};

export const METRIC_LABELS: Record<SummaryMetric, string> = {
  Lday: 'Lday',
  Levening: 'Levening',
  Lnight: 'Lnight',
  Lden: 'Lden',
  LAeq: 'LAeq',
  LA10: 'LA10',
  LA50: 'LA50',
  LA90: 'LA90',
  LAFmax: 'LAFmax',
};

/** Values packed into one word, which tell a reader nothing. */
const isCode = (text: string) => text.length > 40 && !text.includes(' ');

/** A value of a changed figure for people: levels to 0.01, or finer where that would hide the change. */
export function changedText(
  value: number | string | boolean | null,
  other: number | string | boolean | null,
): string {
  if (value === null) return '—';
  if (typeof value === 'string') return isCode(value) ? 'many values' : value;
  if (typeof value !== 'number') return String(value);
  const digits = [2, 4, 6].find(
    (places) => typeof other !== 'number' || value.toFixed(places) !== other.toFixed(places),
  );
  return Number(value.toFixed(digits ?? 6))
    .toString()
    .replace('-', '−');
}
