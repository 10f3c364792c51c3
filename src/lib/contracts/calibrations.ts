import { z } from 'zod';
import { emailAddress, instant, reasonText, shortText } from './common';

/** Largest certificate that is taken. */
export const MOST_CERTIFICATE_BYTES = 10 * 1024 * 1024;

/** Kinds of certificate that are taken, told by their first bytes. */
export const CERTIFICATE_TYPES = ['application/pdf', 'image/png', 'image/jpeg'] as const;
export type CertificateType = (typeof CERTIFICATE_TYPES)[number];

const level = (least: number, most: number) =>
  z
    .number(`must be a level in dB from ${least} to ${most}`)
    .min(least, `must be at least ${least} dB`)
    .max(most, `must be at most ${most} dB`);

export const newCalibrationSchema = z.object({
  instrument: z.number('must be the number of an instrument').int(),
  checkedAt: instant,
  calibrator: z.string('must be text').trim().max(160, 'must have at most 160 characters').default(''),
  calibratorLevel: level(60, 140).describe('Level of the calibrator at 1 kHz, dB'),
  before: level(0, 160).describe('What the instrument showed, before any adjustment, dB'),
  after: level(0, 160).nullable().default(null).describe('What it showed after; null: it was not adjusted'),
  checkedBy: shortText.describe('Who did the check'),
  note: z.string('must be text').trim().max(500, 'must have at most 500 characters').default(''),
});
export type NewCalibration = z.output<typeof newCalibrationSchema>;

export const calibrationWithdrawalSchema = z.object({ reason: reasonText });

export const calibrationSettingsSchema = z.object({
  driftBound: z
    .number('must be a number of dB')
    .min(0.1, 'must be at least 0.1 dB')
    .max(5, 'must be at most 5 dB')
    .describe(
      'A drift beyond this, either way, makes data since the last good check doubtful; practice 0.5–1.0 dB',
    ),
  checkEveryDays: z
    .number('must be a whole number of days')
    .int('must be a whole number of days')
    .min(1, 'must be at least 1')
    .max(1500, 'must be at most 1500'),
  remindBeforeDays: z
    .number('must be a whole number of days')
    .int('must be a whole number of days')
    .min(0, 'must be at least 0')
    .max(180, 'must be at most 180'),
  recipients: z
    .array(emailAddress)
    .max(20, 'must be at most 20 addresses')
    .describe('Who is reminded; empty: the operators of the network'),
});
export type CalibrationSettingsJson = z.output<typeof calibrationSettingsSchema>;

export const calibrationSchema = z.object({
  id: z.number().int(),
  instrument: z.number().int(),
  serialNumber: z.string(),
  station: z.string().nullable().describe('Where it stood then'),
  checkedAt: z.string(),
  calibrator: z.string(),
  calibratorLevel: z.number(),
  before: z.number(),
  after: z.number().nullable(),
  drift: z.number().describe('`before` less the level of the calibrator, dB'),
  driftBound: z.number().describe('Of the network when the check was noted, dB'),
  isWithinBound: z.boolean(),
  checkedBy: z.string(),
  note: z.string(),
  certificate: z.object({ type: z.string(), bytes: z.number().int(), sha256: z.string() }).nullable(),
  createdAt: z.string(),
  createdBy: z.string().nullable(),
  withdrawal: z.object({ at: z.string(), by: z.string().nullable(), reason: z.string() }).nullable(),
});
export type Calibration = z.output<typeof calibrationSchema>;

export const DOUBT_DECISIONS = ['keep', 'exclude'] as const;

export const doubtDecisionSchema = z.object({
  calibration: z.number('must be the number of a check').int(),
  station: z.string('must be text').max(32),
  from: instant,
  decision: z.enum(DOUBT_DECISIONS, 'must be keep or exclude'),
  reason: reasonText,
});
export type DoubtDecision = z.output<typeof doubtDecisionSchema>;

export const doubtSchema = z.object({
  calibration: z.number().int().describe('The check that made the data doubtful'),
  instrument: z.number().int(),
  serialNumber: z.string(),
  station: z.string(),
  from: z.string(),
  to: z.string().nullable().describe('Null: until the next good check'),
  drift: z.number().describe('dB'),
  driftBound: z.number().describe('dB'),
  state: z.enum(['undecided', 'kept', 'excluded']),
  decision: z.object({ by: z.string().nullable(), at: z.string(), reason: z.string() }).nullable(),
});
export type Doubt = z.output<typeof doubtSchema>;

export const dueCheckSchema = z.object({
  instrument: z.number().int(),
  serialNumber: z.string(),
  station: z.string().nullable(),
  lastCheckedAt: z.string().nullable(),
  dueOn: z.string().describe('Local date'),
  state: z.enum(['fine', 'soon', 'overdue']),
});
export type DueCheck = z.output<typeof dueCheckSchema>;
