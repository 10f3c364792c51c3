import { z } from 'zod';

const RFC_3339 = /^\d{4}-\d{2}-\d{2}[Tt]([01]\d|2[0-3]):\d{2}:\d{2}(\.\d{1,9})?([Zz]|[+-]\d{2}:\d{2})$/;

/**
 * Epoch seconds of an RFC 3339 instant with any offset, or null. A day that the calendar lacks (31 February) is null, too.
 * Fractions of a second are kept.
 */
export function parseInstant(text: string): number | null {
  if (!RFC_3339.test(text)) return null;
  const milliseconds = Date.parse(text);
  if (Number.isNaN(milliseconds)) return null;
  // Every month has a 28th: of most instants, thousands a post, the calendar need not be asked.
  if (Number(text.slice(8, 10)) > 28 && !isCalendarDay(text.slice(0, 10))) return null;
  return milliseconds / 1000;
}

function isCalendarDay(text: string): boolean {
  const midnight = new Date(`${text}T00:00:00Z`);
  return !Number.isNaN(midnight.getTime()) && midnight.toISOString().startsWith(text);
}

/** `2026-03-01T00:00:00Z` of epoch seconds. */
export function formatInstantUtc(epochSec: number): string {
  return new Date(epochSec * 1000).toISOString().replace('.000Z', 'Z');
}

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
export const problemSchema = z.object({
  type: z.string(),
  status: z.number().int(),
  code: z.string(),
  title: z.string(),
  detail: z.string().optional(),
  fields: z.array(z.object({ field: z.string(), message: z.string() })).optional(),
});
