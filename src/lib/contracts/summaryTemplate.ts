import { z } from 'zod';
import { REPORT_LANGUAGES } from './reports';

/** Parts of a month’s document that a network may leave out; in their order. Method, cautions and sign-off always stand. */
export const SUMMARY_SECTIONS = [
  'limits',
  'compliance',
  'exceedances',
  'year-to-date',
  'days',
  'heat-map',
  'bands',
  'octaves',
  'spectrogram',
  'tonality',
  'exclusions',
  'calibrations',
  'weather',
  'complaints',
  'glossary',
] as const;
export type SummarySection = (typeof SUMMARY_SECTIONS)[number];

/** Figures that the tables of stations and days show; coverage always stands beside them. */
export const SUMMARY_METRICS = [
  'Lday',
  'Levening',
  'Lnight',
  'Lden',
  'LAeq',
  'LA10',
  'LA50',
  'LA90',
  'LAFmax',
] as const;
export type SummaryMetric = (typeof SUMMARY_METRICS)[number];

const block = z.string().trim().max(4000, 'must have at most 4000 characters');

/** How a network’s month looks in print. The files with data carry everything, whatever is chosen here. */
export const summaryTemplateSchema = z.object({
  networkName: z
    .string()
    .trim()
    .max(160, 'must have at most 160 characters')
    .nullable()
    .describe('On the title page; null: as the network is called'),
  introduction: block.describe('Before the figures; paragraphs are parted by an empty line'),
  closing: block.describe('Before the sign-off'),
  sections: z.array(z.enum(SUMMARY_SECTIONS)),
  metrics: z.array(z.enum(SUMMARY_METRICS)).min(1, 'must name at least one figure'),
  language: z.enum(REPORT_LANGUAGES),
});
export type SummaryTemplate = z.output<typeof summaryTemplateSchema>;

/** What holds where a network has chosen nothing. */
export const DEFAULT_SUMMARY_TEMPLATE: SummaryTemplate = {
  networkName: null,
  introduction: '',
  closing: '',
  sections: [...SUMMARY_SECTIONS],
  metrics: [...SUMMARY_METRICS],
  language: 'en',
};
