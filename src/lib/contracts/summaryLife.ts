import { z } from 'zod';
import { reasonText } from './common';
import { manifestFileSchema } from './summaryManifest';
import { monthFiguresSchema } from './summaries';

/** States of the revision of a month that is being made. `issuing`: its files are being written. */
const DRAFT_STATES = ['draft', 'review', 'issuing', 'issued'] as const;
export type DraftState = (typeof DRAFT_STATES)[number];

/** One figure that differs between an issued month and what the data say now. */
const figureChangeSchema = z.object({
  station: z.string().nullable().describe('Null: of the whole network'),
  figure: z.string().describe('Such as `days 2026-03-04 Lnight`'),
  old: z.union([z.number(), z.string(), z.boolean()]).nullable(),
  new: z.union([z.number(), z.string(), z.boolean()]).nullable(),
  why: z.array(z.string()),
});
export type FigureChange = z.output<typeof figureChangeSchema>;

export const stationFiguresSchema = monthFiguresSchema
  .pick({
    Lday: true,
    Levening: true,
    Lnight: true,
    Lden: true,
    LAeq: true,
    LA10: true,
    LA50: true,
    LA90: true,
    LAFmax: true,
    coverage: true,
    meetsMinimum: true,
  })
  .extend({ code: z.string(), name: z.string() });
/** Levels of a station’s month, kept beside the month’s files so that months can be compared without opening them. */
export type StationFigures = z.output<typeof stationFiguresSchema>;

const issuedRevisionSchema = z.object({
  month: z.string(),
  revision: z.number().int(),
  issuedAt: z.string(),
  issuedBy: z.string(),
  note: z.string(),
  isSuperseded: z.boolean().describe('A later revision takes its place'),
  manifestSha256: z.string(),
  files: z.array(manifestFileSchema),
  changes: z.array(figureChangeSchema).nullable().describe('Against the revision before; null: the first'),
});
export type IssuedRevision = z.output<typeof issuedRevisionSchema>;

const revisionProposalSchema = z.object({
  id: z.number().int(),
  ofRevision: z.number().int(),
  foundAt: z.string(),
  state: z.enum(['open', 'accepted', 'dismissed', 'replaced']),
  decidedAt: z.string().nullable(),
  reason: z.string().nullable(),
  changes: z.array(figureChangeSchema),
});
export type RevisionProposal = z.output<typeof revisionProposalSchema>;

const CHECK_KINDS = ['coverage', 'quarantine', 'calibration', 'exceedances', 'recomputation'] as const;

export const summaryCheckSchema = z.object({
  kind: z.enum(CHECK_KINDS),
  isOpen: z.boolean(),
  words: z.string(),
  items: z
    .array(z.object({ words: z.string(), path: z.string().describe('Where it is decided') }))
    .describe('At most fifty'),
});
export type SummaryCheck = z.output<typeof summaryCheckSchema>;

export const summaryCommentSchema = z.object({
  id: z.number().int(),
  revision: z.number().int(),
  body: z.string(),
  by: z.string(),
  at: z.string(),
});
export type SummaryComment = z.output<typeof summaryCommentSchema>;

/** The revision that is being made. */
const summaryDraftSchema = z.object({
  revision: z.number().int(),
  state: z.enum(DRAFT_STATES),
  draftedAt: z.string(),
  computedAt: z.string().nullable().describe('Null: its figures are being made'),
  progress: z.number().int().describe('Stations done of the computation under way'),
  dataSha256: z.string().nullable(),
  documentSha256: z.string().nullable().describe('Names what was reviewed; issuing asks for it'),
  failure: z.string().nullable(),
});
export type SummaryDraft = z.output<typeof summaryDraftSchema>;

export const monthLifeSchema = z.object({
  month: z.string(),
  draft: summaryDraftSchema.nullable(),
  revisions: z.array(issuedRevisionSchema).describe('Latest first'),
  proposals: z.array(revisionProposalSchema).describe('Latest first'),
});
export type MonthLife = z.output<typeof monthLifeSchema>;

export const newCommentSchema = z.object({
  body: z.string().trim().min(1, 'must not be empty').max(2000, 'must have at most 2000 characters'),
});

/** What an operator does with a month. */
export const monthActSchema = z.discriminatedUnion('act', [
  z.object({ act: z.literal('draft') }).describe('Draft it now, or make its figures anew'),
  z.object({ act: z.literal('submit') }).describe('Hand it in for review'),
  z.object({ act: z.literal('return') }).describe('Back from review to draft'),
  z.object({ act: z.literal('discard') }).describe('Give up a revision that is being made'),
  z.object({
    act: z.literal('issue'),
    documentSha256: z.string().describe('Of the draft that was reviewed'),
    confirm: z.literal(true, 'must be confirmed'),
    note: z.string().trim().max(1000, 'must have at most 1000 characters').default(''),
  }),
]);
export type MonthAct = z.output<typeof monthActSchema>;

export const proposalDecisionSchema = z.object({
  decision: z.enum(['accept', 'dismiss']),
  reason: reasonText,
});
export type ProposalDecision = z.output<typeof proposalDecisionSchema>;
