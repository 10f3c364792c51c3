import { z } from 'zod';
import { INVALIDITY_REASONS } from '../acoustics/validity';
import { calibrationSchema } from './calibrations';
import { CAUSES } from './exceedances';
import { LIMIT_UNITS } from './limitMetrics';
import { summaryBandSchema, summaryExceedanceSchema } from './summaries';

/** A band with how much of the time it has a level. */
export const documentBandSchema = summaryBandSchema.extend({ coverage: z.number() });
export type DocumentBand = z.output<typeof documentBandSchema>;

/** Levels of bands by hour, packed: what the picture of the month is drawn from. */
export const packedSpectrogramSchema = z
  .object({
    from: z.string().describe('Beginning of the first column'),
    columnSeconds: z.number().int(),
    columns: z.number().int(),
    bandsHz: z.array(z.number()).describe('Nominal mid-bands, ascending'),
    firstDb: z.number().describe('Level of the code 1'),
    stepDb: z.number().describe('Between codes'),
    codes: z.string().describe('Base64 of a byte a cell, column by column, its bands ascending; 0: no level'),
  })
  .describe('Unweighted Leq of each band and hour to half a decibel, for the picture; no figure rests on it');
export type PackedSpectrogram = z.output<typeof packedSpectrogramSchema>;

export const documentTonalitySchema = z.object({
  notAssessable: z
    .enum(['no-data', 'octave-bands', 'no-neighbours', 'averaged-too-short'])
    .nullable()
    .describe('Why the mean spectrum says nothing about tones'),
  tones: z
    .array(
      z.object({
        method: z.enum(['survey', 'adjacent-pair']),
        lowerHz: z.number().describe('Lower edge: a band tells a range, not a frequency'),
        upperHz: z.number(),
        excess: z.number().describe('dB above the louder neighbouring band'),
        threshold: z.number().describe('What it had to reach, dB'),
      }),
    )
    .describe('Of the mean spectrum of the month'),
  blockSeconds: z.number().int().describe('Length of the mean spectra that are looked at one by one'),
  assessedBlocks: z.number().int(),
  tonalBlocks: z.number().int().describe('Of those the ones with a tone by the survey method'),
  bands: z
    .array(z.object({ nominalHz: z.number(), blocks: z.number().int() }))
    .describe('By the survey method, how many blocks have a tone in which band; most often first'),
});
export type DocumentTonality = z.output<typeof documentTonalitySchema>;

export const lowFrequencySchema = z.object({
  bound: z.number().describe('dB; a screening, not a finding'),
  difference: z.number().nullable().describe('LCeq − LAeq of the month, dB'),
  isAbove: z.boolean(),
  assessedBlocks: z.number().int().describe('Quarter-hours that have both'),
  blocksAbove: z.number().int(),
});
export type DocumentLowFrequency = z.output<typeof lowFrequencySchema>;

export const COMPARED = [
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

export const exclusionEffectSchema = z.object({
  items: z
    .array(z.object({ from: z.string(), to: z.string(), reason: z.string() }))
    .describe('Standing exclusions by an operator that touch the month'),
  leftOut: z
    .array(z.object({ reason: z.enum(INVALIDITY_REASONS), seconds: z.number().int() }))
    .describe('Time measured and left out, by reason; an interval may have several'),
  figures: z
    .array(
      z.object({
        quantity: z.enum(COMPARED),
        valid: z.number().nullable().describe('As summarised, dB'),
        all: z.number().nullable().describe('Of everything measured, dB'),
        difference: z.number().nullable().describe('Valid less all, dB'),
      }),
    )
    .describe('The same figures with and without what rules and exclusions leave out'),
});
export type ExclusionEffect = z.output<typeof exclusionEffectSchema>;

export const documentExceedanceSchema = summaryExceedanceSchema.extend({
  limitId: z.number().int(),
  limitVersion: z.number().int(),
  cause: z.enum(CAUSES).nullable().describe('As acknowledged; null: nobody has said yet'),
  causeDetail: z.string().nullable(),
  isAcknowledged: z.boolean(),
});
export type DocumentExceedance = z.output<typeof documentExceedanceSchema>;

/** How a station stands to one version of a limit. */
export const complianceSchema = z.object({
  limitId: z.number().int(),
  limitVersion: z.number().int(),
  limit: z.string(),
  metric: z.string(),
  threshold: z.number(),
  unit: z.enum(LIMIT_UNITS),
  windows: z
    .object({
      ended: z.number().int(),
      compared: z.number().int().describe('With the coverage that a comparison needs'),
    })
    .nullable()
    .describe('Windows that begin in the month; null: they are not counted for this quantity'),
  standing: z.number().int(),
  lifted: z.number().int(),
  highest: z.number().nullable().describe('Highest level of a standing exceedance'),
  state: z.enum(['exceeded', 'not-exceeded', 'not-compared']),
});
export type Compliance = z.output<typeof complianceSchema>;

export const windSourceSchema = z.object({
  mast: z
    .object({ code: z.string(), name: z.string() })
    .nullable()
    .describe('Null: the station’s own sensor'),
  from: z.string(),
  to: z.string(),
  meanSpeed: z.number().nullable().describe('m/s'),
  maximumSpeed: z.number().nullable().describe('m/s'),
  direction: z.number().nullable().describe('Degrees from which it came'),
  seconds: z.number().describe('Told of'),
});
export type WindSource = z.output<typeof windSourceSchema>;

/** A check of an instrument with a calibrator, without who did it. */
export const documentCalibrationSchema = calibrationSchema.pick({
  serialNumber: true,
  checkedAt: true,
  calibrator: true,
  calibratorLevel: true,
  before: true,
  after: true,
  drift: true,
  driftBound: true,
  isWithinBound: true,
});
export type DocumentCalibration = z.output<typeof documentCalibrationSchema>;
