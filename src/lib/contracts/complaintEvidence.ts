import { z } from 'zod';
import { LIMIT_UNITS } from './limitMetrics';

const level = z
  .number()
  .nullable()
  .describe('dB, rounded once, half up, to 0.1; null where nothing contributes');

/** What is usual at a station: the same weekday and clock window in the weeks before. */
export const usualSchema = z.object({
  weeks: z.number().int(),
  validWeeks: z.number().int().describe('How many of these weeks had enough valid data'),
  median: level,
  low: level.describe('10 % point of the valid weeks, LAeq'),
  high: level.describe('90 % point of the valid weeks, LAeq'),
});
export type Usual = z.output<typeof usualSchema>;

export const evidenceExceedanceSchema = z.object({
  id: z.number().int(),
  limit: z.string(),
  metric: z.string().describe('Such as LAeq,1 h'),
  from: z.string(),
  to: z.string(),
  level: z.number(),
  threshold: z.number(),
  unit: z.enum(LIMIT_UNITS).optional().describe('Of level and threshold; left out: dB'),
  state: z.enum(['standing', 'lifted']),
});
export type EvidenceExceedance = z.output<typeof evidenceExceedanceSchema>;

/** Tones of the window's mean spectrum. */
export const toneSchema = z.object({
  lowerHz: z.number().describe('Lower edge of the band; a band tells a range, not a frequency'),
  upperHz: z.number(),
  excess: z.number().describe('dB above the louder neighbouring band'),
  method: z.enum(['survey', 'adjacent-pair']),
});
export type Tone = z.output<typeof toneSchema>;

/** Why nothing can be said about tones, or that something can. */
export const TONALITY_STATES = [
  'assessed',
  'octave-bands',
  'no-neighbours',
  'averaged-too-short',
  'no-data',
] as const;

export const stationEvidenceSchema = z.object({
  station: z.string(),
  name: z.string(),
  sampleSeconds: z.number().int().nullable(),
  LAeq: level,
  LAFmax: level,
  LA10: level,
  LA90: level,
  seconds: z.object({ expected: z.number(), valid: z.number(), excluded: z.number() }),
  coverage: z.number(),
  meetsMinimum: z.boolean(),
  usual: usualSchema,
  limits: z.object({
    set: z.number().int().describe('Limits set for the station at that time, whatever their days and hours'),
    applying: z.number().int().describe('Of these, limits with a window that overlaps'),
    unjudged: z.number().int().describe('Windows of limits that overlap and wait to be judged'),
  }),
  exceedances: z.array(evidenceExceedanceSchema),
  tonality: z.enum(TONALITY_STATES),
  tones: z.array(toneSchema),
});
export type StationEvidence = z.output<typeof stationEvidenceSchema>;

/** The figures of a complaint's very window, without anything about a person or an exact place. */
export const evidenceSchema = z.object({
  from: z.string(),
  to: z.string(),
  timeZone: z.string(),
  minimumCoverage: z.number(),
  stations: z.array(stationEvidenceSchema).describe('Nearest first'),
  digest: z.string().describe('SHA-256 of the figures; a reply names the one that it was written from'),
});
export type Evidence = z.output<typeof evidenceSchema>;
