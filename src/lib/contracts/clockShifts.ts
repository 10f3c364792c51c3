import { z } from 'zod';
import { instant, reasonText } from './common';
import { exclusionPreviewSchema } from './exclusions';
import { registerRoute } from './registry';

/** Intervals that one shift may move: nearly a year of minutes, five days and a half of seconds. */
export const MOST_SHIFTED_INTERVALS = 500_000;
/** A clock that lost its date begins again somewhere; further than this none is off. */
const MOST_SHIFT_SEC = 1_300_000_000;
/** Colliding intervals that a preview names. */
export const MOST_SHOWN_COLLISIONS = 20;

const episodeFields = {
  from: instant.describe('First start of the episode, as stored: by the clock of the monitor'),
  to: instant.describe('Exclusive'),
  shiftSeconds: z
    .number('must be a number')
    .int('must be a whole number of seconds')
    .min(-MOST_SHIFT_SEC, 'is too far')
    .max(MOST_SHIFT_SEC, 'is too far')
    .refine((seconds) => seconds !== 0, 'must not be 0')
    .describe('Added to each start: positive for a slow clock'),
  receivedFrom: instant
    .nullable()
    .default(null)
    .describe('What we received before is not of the episode; null: everything is'),
};

function refuseOrder({ from, to }: { from: number; to: number }, context: z.RefinementCtx): void {
  if (to <= from) context.addIssue({ code: 'custom', path: ['to'], message: 'must be after the beginning' });
}

export const clockEpisodeSchema = z.object(episodeFields).superRefine(refuseOrder);
export type ClockEpisodeAsked = z.output<typeof clockEpisodeSchema>;

export const newClockShiftSchema = z
  .object({ ...episodeFields, reason: reasonText })
  .superRefine(refuseOrder);
export type NewClockShiftAsked = z.output<typeof newClockShiftSchema>;

export const shiftReversalSchema = z.object({ reason: reasonText });

const clockShiftSchema = z.object({
  id: z.number().int(),
  from: z.string(),
  to: z.string(),
  shiftSeconds: z.number().int(),
  receivedFrom: z.string().nullable(),
  reason: z.string(),
  state: z
    .enum(['moving', 'moved', 'reversing', 'reversed'])
    .describe('A worker moves the intervals; while it does, posts of this time are answered 503'),
  plannedCount: z.number().int().describe('Intervals that were to move'),
  movedCount: z.number().int().describe('Intervals that have moved'),
  asideCount: z.number().int().describe('Intervals that the reversal put into quarantine'),
  problem: z.string().nullable().describe('Why it was put back by itself'),
  createdAt: z.string(),
  createdBy: z.string().nullable(),
  reversal: z.object({ by: z.string().nullable(), reason: z.string() }).nullable(),
  finishedAt: z.string().nullable(),
});
export type ClockShift = z.output<typeof clockShiftSchema>;

const clockShiftPreviewSchema = z.object({
  intervals: z.number().int().describe('That would move'),
  first: z.string(),
  last: z.string().describe('Start of the last one'),
  quarterHours: z.number().int().describe('That lose or gain something'),
  collisions: z.object({
    count: z
      .number()
      .int()
      .describe('Intervals that would meet one that stays; none moves while there are any'),
    starts: z.array(z.string()).describe(`The first ${MOST_SHOWN_COLLISIONS}, as stored now`),
  }),
  dates: exclusionPreviewSchema.shape.stations.element.shape.dates,
  omittedDates: z.number().int(),
});
export type ClockShiftPreview = z.output<typeof clockShiftPreviewSchema>;

const clockOffsetsSchema = z.object({
  items: z.array(
    z.object({
      at: z.string().describe('Quarter-hour of our clock'),
      aheadSeconds: z.number().describe('By the post with the shortest way; negative: the clock is slow'),
    }),
  ),
});
export type ClockOffsets = z.output<typeof clockOffsetsSchema>;

const base = '/api/v1/networks/{network}/stations/{code}/clock-shifts';
const params = z.object({ network: z.string(), code: z.string() });
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const one = z.object({ shift: clockShiftSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Shifts of a station’s clock, reversed ones too, latest first (not paged)',
  request: { params },
  responses: { 200: answer('The shifts', z.object({ items: z.array(clockShiftSchema) })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Move a whole episode of a wrong clock to its right time (operator)',
  description:
    'Refused while any interval of it would meet one that stays. What the monitor sends again of the episode, with its wrong times, is known.',
  request: { params, body: body(newClockShiftSchema) },
  responses: { 202: answer('The shift; a worker carries it out', one) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/preview`,
  summary: 'What such a shift would move and change (operator); nothing is stored',
  request: { params, body: body(clockEpisodeSchema) },
  responses: { 200: answer('The preview', clockShiftPreviewSchema) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/reversal`,
  summary: 'Put back everything that a shift moved (operator)',
  request: { params: params.extend({ id: z.string() }), body: body(shiftReversalSchema) },
  responses: { 202: answer('The shift; a worker carries it out', one) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/clock-offsets',
  summary: 'How far the monitor’s clock was ahead of ours, a value a quarter-hour (where posts say `sentAt`)',
  request: { params, query: z.object({ from: z.string(), to: z.string() }) },
  responses: { 200: answer('The offsets, ascending (not paged; at most 31 days)', clockOffsetsSchema) },
});
