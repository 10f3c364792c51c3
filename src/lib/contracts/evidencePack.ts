import { z } from 'zod';
import { evidenceSchema } from './complaintEvidence';

/** Items of the evidence, each of which goes with a letter or stays out of it. */
export const PACK_ITEMS = [
  'stations',
  'levels',
  'limits',
  'usual',
  'strip',
  'spectrum',
  'tones',
  'plants',
  'exceedances',
  'exclusions',
  'weather',
  'reports',
  'elsewhere',
] as const;
export type PackItem = (typeof PACK_ITEMS)[number];
export const packItemsSchema = z.array(z.enum(PACK_ITEMS));

/** How far a station may speak for the place where the noise was heard. */
const REPRESENTATIVENESS = ['near', 'area', 'far', 'no-data', 'unknown-place'] as const;

const standingSchema = z.object({
  station: z.string(),
  distanceM: z.number().nullable().describe('From the place; null where that is not known'),
  wind: z.string().nullable().describe('Towards which it lies, seen from the place'),
  bearingDeg: z.number().nullable(),
  verdict: z.enum(REPRESENTATIVENESS),
  reasons: z.array(z.string()),
});
export type Standing = z.output<typeof standingSchema>;

const stripSchema = z.object({
  fromSec: z.number(),
  stepSec: z.number(),
  windowFromSec: z.number(),
  windowToSec: z.number(),
  laeqDb: z.array(z.number().nullable()),
  isValid: z.array(z.boolean()),
  bandsHz: z.array(z.number()),
  bandLevelsDb: z.array(z.array(z.number().nullable())),
});

const otherReportsSchema = z.object({
  withinHours: z.number(),
  withinKm: z.number(),
  count: z.number().int(),
  sameKind: z.number().int(),
});
export type OtherReports = z.output<typeof otherReportsSchema>;

/** When the same spectrum was heard otherwise. */
export const elsewhereSchema = z.object({
  since: z.string(),
  until: z.string(),
  spells: z.array(
    z.object({ station: z.string(), from: z.string(), to: z.string(), likenessDb: z.number() }),
  ),
  count: z.number().int(),
  isComplete: z.boolean(),
  isSearched: z.boolean(),
  note: z.string().nullable(),
});
export type Elsewhere = z.output<typeof elsewhereSchema>;

/**
 * All that can go with an answer. `evidence` is kept in the open with a reply; the rest tells the place and rests sealed
 * with the letter.
 */
export const evidencePackSchema = z.object({
  evidence: evidenceSchema,
  standings: z.array(standingSchema),
  strip: stripSchema.nullable(),
  reports: otherReportsSchema,
  elsewhere: elsewhereSchema.nullable(),
});
export type EvidencePack = z.output<typeof evidencePackSchema>;

/** A figure that is no longer what was sent. `null`: there is none. */
export interface ChangedFigure {
  station: string;
  name: string;
  /** Typesettable: `LAeq`. */
  figure: string;
  unit: string;
  sent: string | null;
  now: string | null;
}
