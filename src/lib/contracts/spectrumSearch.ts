import { z } from 'zod';
import { dataAsOfSchema } from './common';

/** Longest period whose mean spectrum is looked for, in days. */
export const MOST_ASKED_DAYS = 31;
/** Longest stretch that is searched: ten years. The cost grows with it and with the stations. */
export const MOST_SEARCHED_DAYS = 3660;

const number = (least: number, most: number, unit: string) => {
  const message = `must be a number from ${least} to ${most} ${unit}`;
  return z.coerce.number(message).min(least, message).max(most, message);
};

export const spectrumSearchOptionsSchema = z.object({
  likeness: number(0.5, 10, 'dB')
    .default(3)
    .describe('Largest RMS difference in dB between both shapes, each about its own mean'),
  within: number(0, 40, 'dB').optional().describe('Largest difference of LAeq in dB; left out: however loud'),
  lowHz: number(10, 20_000, 'Hz').optional().describe('Lowest band that is compared, nominal Hz'),
  highHz: number(10, 20_000, 'Hz').optional().describe('Highest band that is compared, nominal Hz'),
  gap: number(0, 60, 'minutes')
    .int('must be whole minutes')
    .default(5)
    .describe('Minutes bridged in a spell'),
  order: z.enum(['likeness', 'time'], 'must be likeness or time').default('likeness'),
});
export type SpectrumSearchOptions = z.output<typeof spectrumSearchOptionsSchema>;

const spellSchema = z.object({
  station: z.string(),
  stationName: z.string(),
  from: z.string(),
  to: z.string(),
  minutes: z.number().int().describe('Alike minutes in it; gaps that were bridged are not counted'),
  best: z.number().describe('RMS difference of its most alike minute, dB'),
  mean: z.number().describe('Mean RMS difference over its alike minutes, dB'),
  LAeq: z.number().describe('Of its alike minutes, dB'),
});
export type SpectrumSpell = z.output<typeof spellSchema>;

const searchedStationSchema = z.object({
  station: z.string(),
  stationName: z.string(),
  days: z.number().int().describe('Days of UTC with data that were searched'),
  daysLeftOut: z.number().int().describe('Days left out because they wait for recomputation'),
  minutes: z.number().int().describe('Valid minutes with a spectrum that were searched'),
  coverage: z.number().describe('Those minutes over all minutes of the searched dates up to now'),
  alikeMinutes: z.number().int(),
});

export const spectrumSearchSchema = z.object({
  asked: z.object({
    station: z.string(),
    stationName: z.string(),
    from: z.string(),
    to: z.string(),
    coverage: z.number(),
    meetsMinimum: z.boolean(),
    LAeq: z.number().nullable(),
    bands: z.array(z.object({ nominalHz: z.number(), Leq: z.number() })).describe('Those compared'),
  }),
  since: z.string().describe('Beginning of what was searched'),
  until: z.string().describe('Its end, exclusive'),
  dataAsOf: dataAsOfSchema,
  state: z
    .enum(['searched', 'octave-bands', 'too-few-bands', 'no-data'])
    .describe('Only spectra of at least 12 thirds can be looked for'),
  isComplete: z
    .boolean()
    .describe('False: the search stopped at its time’s end; some days were not searched'),
  tookSeconds: z.number(),
  stations: z.array(searchedStationSchema),
  octaveStations: z.array(z.string()).describe('Stations of octaves, which cannot be searched'),
  spellsFound: z.number().int().describe('Also those that the list leaves out'),
  spells: z.array(spellSchema),
  pattern: z
    .object({
      hours: z.array(z.number().int()).describe('Alike minutes by hour of the clock, 24'),
      weekdays: z.array(z.number().int()).describe('Alike minutes by weekday, Monday first'),
      words: z.string().describe('When and where most of it was, in words; empty with too little to tell'),
    })
    .describe('Of all alike minutes, by the network’s clock'),
});
export type SpectrumSearchAnswer = z.output<typeof spectrumSearchSchema>;
