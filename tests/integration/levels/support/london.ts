import { sec } from './desk';

/**
 * Civil time of London in 2025 as its law has it, without the product's code: an hour ahead from 30 March to 26 October, both
 * at 01:00 UTC.
 */
const FIRST_SUMMER_DATE = '2025-03-30';
const LAST_SUMMER_DATE = '2025-10-26';

/** Epoch seconds of a whole hour from 04:00 to 24:00 on a date of 2025, when no clock changes. */
function atHour(date: string, hour: number): number {
  const isSummer = FIRST_SUMMER_DATE <= date && date < LAST_SUMMER_DATE;
  return sec(`${date}T00:00:00Z`) + (hour - (isSummer ? 1 : 0)) * 3600;
}

/** The date so many days later. */
export function later(date: string, days: number): string {
  return new Date(Date.parse(`${date}T00:00:00Z`) + days * 86_400_000).toISOString().slice(0, 10);
}

/** Day 07–19, evening 19–23 and night 23–07 that begin on a date, and the civil date. */
export function periodsOfDate(date: string) {
  const next = later(date, 1);
  return {
    day: { fromSec: atHour(date, 7), toSec: atHour(date, 19) },
    evening: { fromSec: atHour(date, 19), toSec: atHour(date, 23) },
    night: { fromSec: atHour(date, 23), toSec: atHour(next, 7) },
    civil: { fromSec: atHour(later(date, -1), 24), toSec: atHour(date, 24) },
  };
}
