import { z } from 'zod';
import { LIMIT_UNITS } from './limitMetrics';

const level = z
  .number()
  .nullable()
  .describe('dB, rounded once, half up, to 0.1; null where nothing contributes');

/** Fewer comparable weeks than this say nothing about what is usual. Our own rule. */
export const FEWEST_WEEKS = 3;

/** The usual level, dB, where enough weeks stand behind it to be called so. */
export function usualDbOf(usual: { validWeeks: number; median: number | null }): number | null {
  return usual.validWeeks < FEWEST_WEEKS ? null : usual.median;
}

/** What is usual at a station: the same weekday and clock window in the weeks before. */
export const usualSchema = z.object({
  weeks: z.number().int(),
  validWeeks: z.number().int().describe('How many of these weeks had enough valid data'),
  median: level,
  low: level.describe('10 % point of the valid weeks, LAeq'),
  high: level.describe('90 % point of the valid weeks, LAeq'),
});
export type Usual = z.output<typeof usualSchema>;

const evidenceExceedanceSchema = z.object({
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
const TONALITY_STATES = [
  'assessed',
  'octave-bands',
  'no-neighbours',
  'averaged-too-short',
  'no-data',
] as const;

const excludedSchema = z.object({ from: z.string(), to: z.string(), reason: z.string() });

/** What more a station has to say about the window. Evidence that was kept before there was this lacks it. */
const evidenceContextSchema = z.object({
  rank: z
    .number()
    .nullable()
    .describe('Percentile rank of LAeq among the valid weeks, 100·(below + equal/2)/n, whole per cent'),
  uncertainty: level.describe('Expanded uncertainty U = 2u of LAeq, dB; null where it cannot be told'),
  uncertaintyBasis: z.string().describe('What it rests on, or why it is not known'),
  limits: z
    .array(
      z.object({
        limit: z.string(),
        metric: z.string(),
        threshold: z.number(),
        unit: z.enum(LIMIT_UNITS),
        windows: z
          .array(z.object({ from: z.string(), to: z.string() }))
          .describe('That overlap, the first few'),
        windowCount: z.number().int(),
        isExceeded: z.boolean().describe('By an exceedance that stands'),
      }),
    )
    .describe(
      'In force with a window that overlaps, by the clock windows and holidays that the judge goes by',
    ),
  lowFrequency: z
    .object({ difference: z.number(), bound: z.number(), isAbove: z.boolean() })
    .nullable()
    .describe('LCeq − LAeq, dB'),
  standingOut: z.array(
    z.object({ fromHz: z.number(), toHz: z.number(), isTone: z.boolean(), words: z.string() }),
  ),
  plants: z
    .array(z.object({ name: z.string(), reason: z.string() }))
    .describe('Candidates, most likely first'),
  bandFraction: z.union([z.literal(1), z.literal(3)]),
  bands: z.array(z.object({ nominalHz: z.number(), Leq: level, usual: level })),
  exclusions: z.array(excludedSchema),
  flags: z.array(z.object({ flag: z.string(), seconds: z.number() })),
  wind: z
    .object({ mean: z.number(), maximum: z.number(), directionDeg: z.number().nullable() })
    .nullable()
    .describe('m/s, degrees from; of the source that tells most of the window'),
  windWords: z.string(),
});
export type EvidenceContext = z.output<typeof evidenceContextSchema>;

const stationEvidenceSchema = z.object({
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
  context: evidenceContextSchema.optional(),
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
