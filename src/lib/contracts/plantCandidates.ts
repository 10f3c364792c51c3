import { z } from 'zod';
import { instant } from './common';

/** Longest period whose mean spectrum is asked for plants, in days. */
export const MOST_CANDIDATE_DAYS = 31;

export const plantFindingSchema = z.object({
  plant: z.number().int(),
  plantName: z.string(),
  plantVersion: z.number().int().describe('As the plant was noted then'),
  from: z.string(),
  to: z.string(),
  verdict: z.enum(['confirmed', 'rejected']),
  namedBecause: z.string().describe('The words that named it; empty: nothing did'),
  note: z.string(),
  decidedAt: z.string(),
  decidedBy: z.string().nullable().describe('Name of the person'),
});
export type PlantFinding = z.output<typeof plantFindingSchema>;

const plantCandidateSchema = z.object({
  plant: z.number().int(),
  name: z.string(),
  kind: z.string(),
  source: z.enum(['blade-pass', 'firing', 'mains', 'own-tone', 'shaft']),
  rangesExplained: z.number().int().describe('How many of the ranges that stand out'),
  scheduledShare: z.number().describe('Part of the period in which it was scheduled to run, 0–1'),
  distanceM: z.number().nullable().describe('To the station; null where its place is not noted'),
  fit: z.number().describe('Part of its own range of frequencies inside the band; 1 for a fixed speed'),
  reason: z.string(),
});
export type PlantCandidate = z.output<typeof plantCandidateSchema>;

export const plantCandidatesSchema = z.object({
  from: z.string(),
  to: z.string(),
  coverage: z.number(),
  meetsMinimum: z.boolean(),
  state: z
    .enum(['assessed', 'octave-bands', 'no-neighbours', 'averaged-too-short', 'no-data'])
    .describe('Whether the mean spectrum could be examined; octaves are too wide to name a plant'),
  standingOut: z
    .array(z.object({ fromHz: z.number(), toHz: z.number(), isTone: z.boolean(), words: z.string() }))
    .describe('Among neighbours, most telling first; a broadband sound has none, and so no candidates'),
  candidates: z.array(plantCandidateSchema).describe('Most likely first'),
  findings: z.array(plantFindingSchema).describe('What people said about overlapping periods, latest first'),
});
export type PlantCandidates = z.output<typeof plantCandidatesSchema>;

export const newPlantFindingSchema = z
  .object({
    from: instant,
    to: instant,
    plant: z.number('must be the number of a plant').int('must be the number of a plant'),
    verdict: z.enum(['confirmed', 'rejected'], 'must be confirmed or rejected'),
    note: z.string('must be text').trim().max(500, 'must have at most 500 characters').default(''),
  })
  .superRefine(({ from, to }, context) => {
    if (to <= from)
      context.addIssue({ code: 'custom', path: ['to'], message: 'must be after the beginning' });
    else if (to - from > MOST_CANDIDATE_DAYS * 86_400) {
      const message = `must be at most ${MOST_CANDIDATE_DAYS} days after the beginning`;
      context.addIssue({ code: 'custom', path: ['to'], message });
    }
  });
export type NewPlantFinding = z.output<typeof newPlantFindingSchema>;
