import { z } from 'zod';
import { bandByNominalHz } from '#lib/acoustics/bands';
import { FACADE_CORRECTION_DB } from '#lib/acoustics/facade';
import { FLAG_NAMES, type FlagName } from '#lib/acoustics/validity';
import { instant, reasonText, shortText } from './common';
import { registerRoute } from './registry';

const code = z
  .string()
  .trim()
  .regex(/^[A-Za-z0-9][A-Za-z0-9_-]{0,31}$/, 'must be 1 to 32 letters, digits, - or _, such as MER-09');
const latitude = z
  .number('must be a number of degrees')
  .min(-90, 'must be −90 to 90')
  .max(90, 'must be −90 to 90');
const longitude = z
  .number('must be a number of degrees')
  .min(-180, 'must be −180 to 180')
  .max(180, 'must be −180 to 180');
const intervalSeconds = z
  .number('must be a number of seconds')
  .int('must be whole seconds')
  .min(1, 'must be 1 s to 1 h')
  .max(3600, 'must be 1 s to 1 h');
const bandHz = z.number('must be a nominal frequency in Hz').positive();
const bandFraction = z.union([z.literal(1), z.literal(3)], 'must be 1 (octaves) or 3 (one-third octaves)');

/** What a station is expected to flag where nobody has said otherwise: its own checks and the weather. */
export const EXPECTED_FLAGS: readonly FlagName[] = ['calibration', 'selfcheck', 'rain', 'wind'];

const optional = {
  placement: z.enum(['free-field', 'facade']).describe('Free field, or in front of a façade'),
  facadeCorrection: z
    .number('must be a number of dB')
    .min(0, 'must be 0 to 6 dB')
    .max(6, 'must be 0 to 6 dB')
    .describe('Taken off levels measured at a façade when incident sound is reported, dB; 3 by default'),
  mastHeight: z
    .number('must be a number of metres')
    .min(0, 'must be 0 to 200 m')
    .max(200, 'must be 0 to 200 m')
    .nullable()
    .describe('Microphone above ground, m'),
  surroundings: z.string().trim().max(500, 'must have at most 500 characters'),
  expectedFlags: z
    .array(z.enum(FLAG_NAMES as [FlagName, ...FlagName[]], `must be of ${FLAG_NAMES.join(', ')}`))
    .max(FLAG_NAMES.length)
    .describe('Flags that are ordinary here; another that comes often is a trouble. Validity does not ask'),
  acceptsFrom: instant.nullable().describe('Older intervals are refused as too-old; null: no bound'),
};

interface BandsGiven {
  bandFraction: 1 | 3;
  firstBandHz: number;
  lastBandHz: number;
}

/** Says which of the two ends is no band of the fraction, or that they are in the wrong order. */
export function bandRangeIssues({ bandFraction, firstBandHz, lastBandHz }: BandsGiven) {
  const issues: { path: [string]; message: string }[] = [];
  const kind = bandFraction === 3 ? 'one-third-octave' : 'octave';
  const first = bandByNominalHz(bandFraction, firstBandHz);
  const last = bandByNominalHz(bandFraction, lastBandHz);
  const message = `must be the nominal frequency of ${bandFraction === 3 ? 'a' : 'an'} ${kind} band`;
  if (!first) issues.push({ path: ['firstBandHz'], message });
  if (!last) issues.push({ path: ['lastBandHz'], message });
  if (first && last && first.index > last.index) {
    issues.push({ path: ['lastBandHz'], message: 'must not be below the lowest band' });
  }
  return issues;
}

export const newStationSchema = z
  .object({
    code,
    name: shortText,
    latitude,
    longitude,
    bandFraction,
    intervalSeconds,
    firstBandHz: bandHz,
    lastBandHz: bandHz,
    placement: optional.placement.default('free-field'),
    facadeCorrection: optional.facadeCorrection.default(FACADE_CORRECTION_DB),
    mastHeight: optional.mastHeight.default(null),
    surroundings: optional.surroundings.default(''),
    acceptsFrom: optional.acceptsFrom.default(null),
    expectedFlags: optional.expectedFlags.default([...EXPECTED_FLAGS]),
  })
  .superRefine((station, context) => {
    for (const issue of bandRangeIssues(station)) context.addIssue({ code: 'custom', ...issue });
  });
export type NewStation = z.output<typeof newStationSchema>;

/** Code and band fraction stay: what is stored under them would change its meaning. */
export const stationChangesSchema = z
  .object({
    name: shortText,
    latitude,
    longitude,
    intervalSeconds,
    firstBandHz: bandHz,
    lastBandHz: bandHz,
    ...optional,
    placementFrom: instant
      .nullable()
      .describe('From when on a new placement or façade correction holds; null or left out: from now on'),
    retired: z.boolean().describe('A retired station takes no more posts; its data stay'),
    reason: reasonText.describe('Why, for the audit trail'),
  })
  .partial()
  .strict();
export type StationChanges = z.output<typeof stationChangesSchema>;

export const STATION_STATES = ['live', 'silent', 'awaiting', 'retired'] as const;
export type StationState = (typeof STATION_STATES)[number];

export const latestSchema = z.object({
  start: z.string(),
  seconds: z.number().int(),
  LAeq: z.number(),
  LAFmax: z.number().nullable(),
  flags: z.array(z.enum(FLAG_NAMES as [string, ...string[]])),
  windSpeed: z.number().nullable().describe('m/s'),
  battery: z.number().nullable().describe('V'),
  receivedAt: z.string().describe('When the station last posted anything new'),
});
export type Latest = z.output<typeof latestSchema>;

const stationSchema = z.object({
  code: z.string(),
  name: z.string(),
  latitude: z.number(),
  longitude: z.number(),
  bandFraction: z.union([z.literal(1), z.literal(3)]),
  intervalSeconds: z.number().int(),
  firstBandHz: z.number(),
  lastBandHz: z.number(),
  placement: z.enum(['free-field', 'facade']).describe('As of now; dated in `placements` of the statistics'),
  facadeCorrection: z.number().describe('dB taken off at a façade when incident sound is reported'),
  mastHeight: z.number().nullable().describe('m'),
  surroundings: z.string(),
  acceptsFrom: z.string().nullable(),
  expectedFlags: z.array(z.string()).describe('Any other flag that comes often is a trouble'),
  createdAt: z.string(),
  retiredAt: z.string().nullable(),
  state: z
    .enum(STATION_STATES)
    .describe('`silent`: nothing newer than a quarter-hour or three intervals; `awaiting`: nothing ever'),
  overLimit: z.boolean().describe('A limit stands exceeded by a window that ended within the last hour'),
  latest: latestSchema.nullable(),
});
export type Station = z.output<typeof stationSchema>;

const path = '/api/v1/networks/{network}/stations';
const network = z.string();
const inNetwork = { params: z.object({ network }) };
const ofStation = { params: z.object({ network, code: z.string() }) };
const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const one = z.object({ station: stationSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path,
  summary: 'Stations of a network with their newest interval; GeoJSON by Accept or as stations.geojson',
  request: inNetwork,
  responses: {
    200: {
      description: 'Every station, retired ones too, by code',
      content: {
        'application/json': { schema: z.object({ items: z.array(stationSchema), next: z.null() }) },
        'application/geo+json': { schema: z.object({ type: z.literal('FeatureCollection') }).loose() },
      },
    },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path,
  summary: 'Register a station (operator)',
  request: { ...inNetwork, body: jsonOf(newStationSchema) },
  responses: {
    201: {
      description: 'The station and its first token, shown this once',
      ...jsonOf(one.extend({ token: z.string() })),
    },
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${path}/{code}`,
  summary: 'One station with its newest interval',
  request: ofStation,
  responses: { 200: { description: 'The station', ...jsonOf(one) } },
});
registerRoute({
  access: 'person',
  method: 'patch',
  path: `${path}/{code}`,
  summary: 'Change, retire or bring back a station (operator)',
  request: { ...ofStation, body: jsonOf(stationChangesSchema) },
  responses: { 200: { description: 'The station as it is now', ...jsonOf(one) } },
});
