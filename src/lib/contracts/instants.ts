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

/** Whether `2026-02-31` and the like is a day of the calendar. */
export function isCalendarDay(text: string): boolean {
  const midnight = new Date(`${text}T00:00:00Z`);
  return !Number.isNaN(midnight.getTime()) && midnight.toISOString().startsWith(text);
}

/** `2026-03-01T00:00:00Z` of epoch seconds. */
export function formatInstantUtc(epochSec: number): string {
  return new Date(epochSec * 1000).toISOString().replace('.000Z', 'Z');
}
