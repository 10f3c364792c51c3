import { z } from 'zod';
import { formatInstantUtc, isCalendarDay, parseInstant } from './instants';

export { formatInstantUtc, parseInstant };

const LATEST_SEC = 4_294_967_295;

/** An instant, RFC 3339 in, whole epoch seconds inside. */
export const instant = z.string().transform((text, context) => {
  const seconds = parseInstant(text);
  if (seconds === null || seconds < 0 || seconds > LATEST_SEC) {
    context.addIssue({ code: 'custom', message: 'must be an RFC 3339 time such as 2026-03-01T00:00:00Z' });
    return z.NEVER;
  }
  return Math.floor(seconds);
});

/** A civil date. */
export const localDate = z
  .string()
  .refine(
    (text) => /^\d{4}-\d{2}-\d{2}$/.test(text) && isCalendarDay(text),
    'must be a date such as 2026-03-01',
  );

/** Clock time of day, `07:00` in, minutes after midnight inside. `24:00` is 1440. */
export const clockTime = z
  .string()
  .regex(/^([01]\d|2[0-3]):[0-5]\d$|^24:00$/, 'must be a time of day such as 07:00')
  .transform((text) => Number(text.slice(0, 2)) * 60 + Number(text.slice(3)));

/** `07:00` of minutes after midnight. */
export function formatClockTime(minutes: number): string {
  const pad = (value: number) => String(value).padStart(2, '0');
  return `${pad(Math.floor(minutes / 60))}:${pad(minutes % 60)}`;
}

export const emailAddress = z.email('must be an e-mail address').max(254);
export const shortText = z
  .string()
  .trim()
  .min(1, 'must not be empty')
  .max(160, 'must have at most 160 characters');
export const reasonText = z
  .string()
  .trim()
  .min(1, 'must not be empty')
  .max(500, 'must have at most 500 characters');

/** RFC 9457 problem details with Bittern's stable `code`. */
/** Of when data of a long read are. */
export const dataAsOfSchema = z
  .string()
  .nullable()
  .describe('Read from a replica that has everything up to then; null: the data are of now');

export const problemSchema = z.object({
  type: z.string(),
  status: z.number().int(),
  code: z.string(),
  title: z.string(),
  detail: z.string().optional(),
  fields: z.array(z.object({ field: z.string(), message: z.string() })).optional(),
});
