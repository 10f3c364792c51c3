import fc from 'fast-check';
import { expect, test } from 'vitest';
import { periodsOf } from '#lib/time/periods';
import {
  addDays,
  hoursOfDay,
  instantAtSec,
  isLocalDate,
  localDateAt,
  startOfDaySec,
  weekdayOf,
} from '#lib/time/zone';

const DEFAULT_SCHEME = { dayStartMin: 7 * 60, eveningStartMin: 19 * 60, nightStartMin: 23 * 60 };
const NO_EVENING = { dayStartMin: 7 * 60, eveningStartMin: null, nightStartMin: 22 * 60 };
const ZONES = ['Europe/London', 'America/New_York', 'Australia/Lord_Howe', 'Asia/Kathmandu', 'UTC'];
const hoursOf = (period: { fromSec: number; toSec: number }) => (period.toSec - period.fromSec) / 3600;

test('the night of a clock change is an hour shorter or longer (Europe, Directive 2000/84/EC)', () => {
  const night = (date: string) => periodsOf(date, DEFAULT_SCHEME, 'Europe/London')[2];
  expect(hoursOf(night('2026-03-28')!)).toBe(7);
  expect(hoursOf(night('2026-10-24')!)).toBe(9);
  expect(hoursOf(night('2026-06-01')!)).toBe(8);
});

test('Lord Howe shifts by half an hour', () => {
  expect(hoursOfDay('2026-04-05', 'Australia/Lord_Howe')).toBe(24.5);
  expect(hoursOfDay('2026-10-04', 'Australia/Lord_Howe')).toBe(23.5);
});

test('a scheme without evening has day and night only', () => {
  expect(periodsOf('2026-06-01', NO_EVENING, 'UTC').map((period) => period.kind)).toEqual(['day', 'night']);
});

test('periods tile time: every instant lies in exactly one, and neighbours touch', () => {
  const anyInstant = fc.integer({ min: 1_700_000_000, max: 1_900_000_000 });
  fc.assert(
    fc.property(anyInstant, fc.constantFrom(...ZONES), fc.boolean(), (atSec, zone, hasEvening) => {
      const scheme = hasEvening ? DEFAULT_SCHEME : NO_EVENING;
      const date = localDateAt(atSec, zone);
      const periods = [-1, 0, 1].flatMap((days) => periodsOf(addDays(date, days), scheme, zone));
      expect(periods.filter(({ fromSec, toSec }) => fromSec <= atSec && atSec < toSec)).toHaveLength(1);
      periods.slice(1).forEach((period, at) => expect(period.fromSec).toBe(periods[at]?.toSec));
    }),
    { numRuns: 150 },
  );
});

test('an hour that the spring change skips falls just after it; of a repeated one the first is meant', () => {
  expect(instantAtSec('2026-03-29', 90, 'Europe/London')).toBe(Date.parse('2026-03-29T01:30:00Z') / 1000);
  expect(instantAtSec('2026-10-25', 90, 'Europe/London')).toBe(Date.parse('2026-10-25T00:30:00Z') / 1000);
});

test('dates', () => {
  expect(addDays('2026-02-28', 1)).toBe('2026-03-01');
  expect(weekdayOf('2026-12-01')).toBe(1);
  expect(isLocalDate('2026-02-30')).toBe(false);
  expect(localDateAt(startOfDaySec('2026-07-04', 'America/New_York'), 'America/New_York')).toBe('2026-07-04');
});
