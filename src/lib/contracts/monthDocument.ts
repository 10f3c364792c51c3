import { z } from 'zod';
import { placementSpanSchema } from './levels';
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
import { periodInstrumentsSchema } from './periodInstruments';
import { registry } from './registry';
import { conventionSchema, month } from './summaries';

/** Changes when a reader of the file has to. */
export const MONTH_DOCUMENT_FORM = 'bittern-month-1';

const documentStationSchema = z.object({
  code: z.string(),
  name: z.string(),
  latitude: z.number(),
  longitude: z.number(),
  placement: z.enum(['free-field', 'facade']),
  mastHeightMetres: z.number().nullable(),
  bandFraction: z.union([z.literal(1), z.literal(3)]),
  intervalSeconds: z.number().int(),
  placements: z.array(placementSpanSchema).describe('How the microphone stood; levels are as measured'),
  instruments: periodInstrumentsSchema,
  masts: z
    .array(z.object({ code: z.string(), name: z.string(), from: z.string(), to: z.string() }))
    .describe('Weather masts that it went by where its own sensor told no wind'),
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

/** Everything that a month’s files and pages say, made by one computation: pure data. Levels unrounded in dB, times RFC 3339 UTC. */
export const monthDocumentSchema = z.object({
  form: z.literal(MONTH_DOCUMENT_FORM),
  network: z.object({ slug: z.string(), name: z.string() }),
  month,
  timeZone: z.string(),
  from: z.string().describe('Local midnight that begins the month'),
  to: z.string().describe('Local midnight that ends the month'),
  nightsTo: z.string().describe('End of the night that begins on the last date'),
  isToDate: z.boolean().describe('The month, or its last night, is not over'),
  generatedAt: z.string(),
  conventions: z.array(conventionSchema).min(1),
  complaints: z
    .object({ open: z.number().int(), answered: z.number().int(), closed: z.number().int() })
    .describe('Complaints about noise that began in the month, by how they stand'),
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
