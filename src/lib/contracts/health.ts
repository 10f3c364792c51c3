import { z } from 'zod';
import { emailAddress } from './common';

/** What can be wrong with a station, worst first. */
export const TROUBLE_KINDS = [
  'silent',
  'clock',
  'frozen',
  'bands',
  'floor',
  'flags',
  'battery',
  'late',
  'coverage',
  'wind',
  'drift',
  'selfcheck',
] as const;
export type TroubleKind = (typeof TROUBLE_KINDS)[number];

const amount = (least: number, most: number) =>
  z.number('must be a number').min(least, `must be at least ${least}`).max(most, `must be at most ${most}`);

/** Bounds beyond which something is a trouble. What is left out holds as it does for the network, or by default. */
export const thresholdsSchema = z.object({
  silentAfterMinutes: amount(1, 10_080)
    .describe('Without a post; never less than three intervals')
    .optional(),
  lateAfterMinutes: amount(1, 10_080)
    .describe('Posts come, but the newest data are older; never less than three intervals')
    .optional(),
  leastCoverage: amount(0, 1).describe('Share of the last 24 hours that was received').optional(),
  leastBattery: amount(0, 100).describe('V').optional(),
  mostClockOffSeconds: amount(1, 3600).optional(),
  frozenForMinutes: amount(1, 60).describe('The very same levels, band by band').optional(),
  floorShift: amount(1, 60).describe('dB between the quiet of the last day and the usual').optional(),
  windStuckForHours: amount(0.5, 168).describe('The very same wind speed').optional(),
  driftShift: amount(0.5, 20)
    .describe(
      'dB between the nightly background, against the neighbours’, and what it was eight weeks before',
    )
    .optional(),
  selfCheckShift: amount(0.1, 10)
    .describe('dB between the self-checks and what they were eight weeks before')
    .optional(),
});
export type Thresholds = z.output<typeof thresholdsSchema>;
export type FullThresholds = Required<Thresholds>;

/** What holds where nobody has said otherwise. */
export const DEFAULT_THRESHOLDS: FullThresholds = {
  silentAfterMinutes: 15,
  lateAfterMinutes: 30,
  leastCoverage: 0.9,
  leastBattery: 11.8,
  mostClockOffSeconds: 60,
  frozenForMinutes: 15,
  floorShift: 10,
  windStuckForHours: 6,
  driftShift: 1.5,
  selfCheckShift: 0.5,
};

export const healthSettingsSchema = z.object({
  station: z
    .string('must be text')
    .max(32)
    .nullable()
    .default(null)
    .describe('Null: what holds for the whole network'),
  thresholds: thresholdsSchema,
  recipients: z
    .array(emailAddress)
    .max(20, 'must be at most 20 addresses')
    .default([])
    .describe('Who is told, of the whole network only; empty: its operators'),
});
export type HealthSettings = z.output<typeof healthSettingsSchema>;

export const troubleSchema = z.object({
  id: z.number().int(),
  station: z.string(),
  stationName: z.string(),
  kind: z.enum(TROUBLE_KINDS),
  since: z.string(),
  until: z.string().nullable().describe('Null while it goes on'),
  what: z.string().describe('In words'),
  advice: z.string().describe('What to do'),
});
export type Trouble = z.output<typeof troubleSchema>;

export const stationHealthSchema = z.object({
  station: z.string(),
  name: z.string(),
  state: z.enum(['awaiting', 'live', 'silent', 'retired']),
  newestEnd: z.string().nullable(),
  lastPost: z.string().nullable(),
  received24h: z.number().describe('Share of the last 24 hours that was received'),
  battery: z.number().nullable().describe('V'),
  clockAhead: z.number().nullable().describe('s; null where the monitor does not send its time'),
  troubles: z.array(z.enum(TROUBLE_KINDS)),
});
export type StationHealth = z.output<typeof stationHealthSchema>;

export const coverageDaySchema = z.object({
  date: z.string(),
  elapsedSeconds: z.number(),
  validSeconds: z.number(),
  excludedSeconds: z.number().describe('Received, but left out by flags, wind, rain or an exclusion'),
  coverage: z.number().nullable().describe('Null: the day has not begun'),
});
export type CoverageDay = z.output<typeof coverageDaySchema>;
