import { z } from 'zod';
import { limitVersionSchema } from './limits';
import {
  complianceSchema,
  documentBandSchema,
  documentCalibrationSchema,
  documentExceedanceSchema,
  documentTonalitySchema,
  exclusionEffectSchema,
  lowFrequencySchema,
  packedSpectrogramSchema,
  windSourceSchema,
} from './monthEvidence';
import {
  documentDaySchema,
  documentFiguresSchema,
  documentHourSchema,
  yearToDateSchema,
} from './monthFigures';
import { registry } from './registry';
import { summarySchema, summaryStationSchema } from './summaries';

/** Changes when a reader of the file has to. */
export const MONTH_DOCUMENT_FORM = 'bittern-month-1';

export const documentStationSchema = summaryStationSchema.extend({
  standsFrom: z.string().describe('When the station was registered'),
  standsTo: z.string().nullable().describe('When it was retired'),
  coverageSinceRegistration: z
    .number()
    .nullable()
    .describe(
      'Valid seconds over those elapsed of the month since the registration; null: registered after it',
    ),
  figures: documentFiguresSchema,
  yearToDate: yearToDateSchema,
  days: z.array(documentDaySchema),
  hours: z
    .array(documentHourSchema)
    .describe('Hours of the clock on the wall that have begun, in order of time'),
  bands: z.array(documentBandSchema),
  octaves: z
    .array(documentBandSchema)
    .describe('Of a station with thirds their energy sums; L_N of each interval’s own sums'),
  spectrogram: packedSpectrogramSchema.nullable().describe('Null without band levels'),
  tonality: documentTonalitySchema,
  lowFrequency: lowFrequencySchema,
  exclusions: exclusionEffectSchema,
  exceedances: z.object({
    standing: z.number().int(),
    lifted: z.number().int(),
    items: z.array(documentExceedanceSchema),
  }),
  compliance: z.array(complianceSchema),
  calibrations: z.array(documentCalibrationSchema).describe('Standing checks in the month, in order of time'),
  wind: z.array(windSourceSchema),
});
export type DocumentStation = z.output<typeof documentStationSchema>;

/** What a version of a limit says, as far as a reader needs it. */
export const documentLimitSchema = limitVersionSchema
  .pick({
    version: true,
    name: true,
    metric: true,
    descriptor: true,
    threshold: true,
    unit: true,
    weekdays: true,
    holidays: true,
    from: true,
    to: true,
    minimumCoverage: true,
    windWords: true,
    stations: true,
    groupName: true,
    reason: true,
    effectiveFrom: true,
    effectiveTo: true,
  })
  .extend({ id: z.number().int() });
export type DocumentLimit = z.output<typeof documentLimitSchema>;

/**
 * Everything that a month’s files say, made by one computation: pure data. Levels unrounded in dB, times RFC 3339 UTC. It has all that
 * the summary has, and more.
 */
export const monthDocumentSchema = summarySchema.omit({ status: true }).extend({
  form: z.literal(MONTH_DOCUMENT_FORM),
  nightsTo: z.string().describe('End of the night that begins on the last date'),
  limits: z.array(documentLimitSchema).describe('Versions in force at some time of the month'),
  stations: z.array(documentStationSchema),
});
export type MonthDocument = z.output<typeof monthDocumentSchema>;

// Published as it is read: of the JSON file of a month.
registry.registerComponent(
  'schemas',
  'MonthDocument',
  z.toJSONSchema(monthDocumentSchema, { io: 'input' }) as object,
);
