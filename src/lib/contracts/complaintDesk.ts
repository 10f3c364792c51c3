import { z } from 'zod';

const WEEKDAYS = 7;
const whole = (least: number, most: number) =>
  z
    .number({ error: 'must be a whole number' })
    .int('must be a whole number')
    .min(least, `must be from ${least} to ${most}`)
    .max(most, `must be from ${least} to ${most}`);

/** Steps to which the place of a complaint is told, hundredths of a degree (0.01° is about 1.1 km); 0: not at all. */
export const PLACE_STEPS = [1, 2, 5, 10, 0] as const;

/** How a network's desk works. */
export const deskSettingsSchema = z.object({
  answerDays: whole(1, 60).describe('Working days within which a complaint is answered'),
  workingWeekdays: z
    .array(whole(0, WEEKDAYS - 1))
    .min(1, 'must have at least one day')
    .describe('0 Monday to 6 Sunday'),
  remindDays: whole(0, 20).describe('Working days before the due date; 0: no reminder beforehand'),
  retentionMonths: whole(1, 120).describe('Months after the end of a complaint until it is about nobody'),
  placeStepHundredths: z.literal(PLACE_STEPS, { error: 'must be one of the list' }),
});
export type DeskSettings = z.output<typeof deskSettingsSchema>;

export const DEFAULT_DESK_SETTINGS: DeskSettings = {
  answerDays: 10,
  workingWeekdays: [0, 1, 2, 3, 4],
  remindDays: 2,
  retentionMonths: 24,
  placeStepHundredths: 1,
};

/** Longest internal note, characters. */
const MOST_NOTE_CHARACTERS = 4000;

export const noteSchema = z
  .string()
  .trim()
  .min(1, 'must not be empty')
  .max(MOST_NOTE_CHARACTERS, `must have at most ${MOST_NOTE_CHARACTERS} characters`)
  .transform((text) => text.replaceAll('\r\n', '\n'));
