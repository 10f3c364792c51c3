import { z } from 'zod';
import { clockTime, reasonText } from './common';
import { WEEKDAYS } from './limits';

export const PLANT_KINDS = ['fan', 'pump', 'compressor', 'engine', 'transformer', 'alarm', 'other'] as const;
export type PlantKind = (typeof PLANT_KINDS)[number];

const number = (message: string, least: number, most: number) =>
  z.number(message).min(least, message).max(most, message).nullable().default(null);
const count = (most: number) =>
  z
    .number(`must be a whole number from 1 to ${most}`)
    .int(`must be a whole number from 1 to ${most}`)
    .min(1, `must be a whole number from 1 to ${most}`)
    .max(most, `must be a whole number from 1 to ${most}`)
    .nullable()
    .default(null);
const rpm = number('must be 1 to 100000 revolutions a minute', 1, 100_000);

const fields = {
  name: z
    .string('must be text')
    .trim()
    .min(1, 'must not be empty')
    .max(80, 'must have at most 80 characters')
    .describe('As people on the site call it; unique in the network'),
  kind: z.enum(PLANT_KINDS, `must be one of ${PLANT_KINDS.join(', ')}`),
  latitude: number('must be −90 to 90 degrees', -90, 90),
  longitude: number('must be −180 to 180 degrees', -180, 180),
  minRpm: rpm.describe('Speed of rotation, 1/min; the lowest where it varies'),
  maxRpm: rpm.describe('The highest; left out: the speed is fixed'),
  blades: count(500).describe('Blades of a fan, vanes of a pump, lobes of a blower'),
  poles: count(100).describe(
    'Of the motor; with the mains frequency they stand in for a speed that is not known',
  ),
  cylinders: count(64),
  strokes: z
    .union([z.literal(2), z.literal(4)], 'must be 2 or 4')
    .nullable()
    .default(null),
  mainsHz: number('must be 10 to 1000 Hz', 10, 1000).describe('Frequency of its supply'),
  toneHz: number('must be 1 to 20000 Hz', 1, 20_000).describe('A frequency known for itself, as of an alarm'),
  weekdays: z
    .array(z.enum(WEEKDAYS, `must be from ${WEEKDAYS.join(', ')}`))
    .min(1, 'must name at least one day')
    .default([...WEEKDAYS])
    .describe('Days on which it is scheduled to run; of the local date on which a run begins'),
  from: clockTime.nullable().default(null).describe('Local time at which it starts; null: all day'),
  to: clockTime.nullable().default(null).describe('Before `from`: across midnight'),
  notes: z.string('must be text').trim().max(1000, 'must have at most 1000 characters').default(''),
};

type Checked = z.output<z.ZodObject<typeof fields>>;

function checkTogether(plant: Checked, context: z.RefinementCtx): void {
  const issue = (path: keyof Checked, message: string) =>
    context.addIssue({ code: 'custom', path: [path], message });
  const { latitude, longitude, minRpm, maxRpm, blades, poles, cylinders, strokes, mainsHz, from, to } = plant;
  if ((latitude === null) !== (longitude === null)) {
    issue(latitude === null ? 'latitude' : 'longitude', 'must be given together with the other one');
  }
  if (minRpm === null && maxRpm !== null) issue('minRpm', 'must be given with the highest speed');
  if (minRpm !== null && maxRpm !== null && maxRpm < minRpm) issue('maxRpm', 'must not be below the lowest');
  if (poles !== null && poles % 2 === 1) issue('poles', 'must be an even number');
  if (poles !== null && mainsHz === null) issue('mainsHz', 'must be given with the poles of a motor');
  const hasRotation = minRpm !== null || poles !== null;
  if (blades !== null && !hasRotation)
    issue('minRpm', 'must be given with blades (or the poles of its motor)');
  if (cylinders !== null && !hasRotation) issue('minRpm', 'must be given with cylinders');
  if ((cylinders === null) !== (strokes === null)) {
    issue(cylinders === null ? 'cylinders' : 'strokes', 'cylinders and strokes go together');
  }
  if ((from === null) !== (to === null)) {
    issue(from === null ? 'from' : 'to', 'must be given together with the other one');
  } else if (from !== null && from === to) {
    issue('to', 'must differ from the beginning; leave both out for all day');
  } else if (from === 1440) {
    issue('from', 'must be from 00:00 to 23:59');
  }
}

export const newPlantSchema = z.object(fields).superRefine(checkTogether);
export type NewPlant = z.output<typeof newPlantSchema>;

/** The next version of what is noted about a plant: all of it, with the reason for the change. */
export const newPlantVersionSchema = z.object({ ...fields, reason: reasonText }).superRefine(checkTogether);
export type NewPlantVersion = z.output<typeof newPlantVersionSchema>;

export const plantRetirementSchema = z.object({
  retired: z.boolean('must be true or false'),
  reason: reasonText,
});

const level = z.number().nullable();

export const plantVersionSchema = z.object({
  version: z.number().int(),
  name: z.string(),
  kind: z.enum(PLANT_KINDS),
  latitude: level,
  longitude: level,
  minRpm: level,
  maxRpm: level.describe('Equal to `minRpm` where the speed is fixed'),
  blades: level,
  poles: level,
  cylinders: level,
  strokes: z.union([z.literal(2), z.literal(4)]).nullable(),
  mainsHz: level,
  toneHz: level,
  weekdays: z.array(z.enum(WEEKDAYS)),
  from: z.string().nullable(),
  to: z.string().nullable(),
  notes: z.string(),
  reason: z.string().describe('Of this version'),
  changedAt: z.string(),
  changedBy: z.string().nullable().describe('Name of the person'),
});
export type PlantVersion = z.output<typeof plantVersionSchema>;

export const plantSchema = plantVersionSchema.extend({
  id: z.number().int(),
  createdAt: z.string(),
  retirement: z
    .object({ at: z.string(), reason: z.string() })
    .nullable()
    .describe('Set where it is out of use; it keeps its history'),
});
export type Plant = z.output<typeof plantSchema>;
