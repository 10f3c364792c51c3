import { describe, expect, test } from 'vitest';
import { DEFAULT_SCHEME, ldenDb, nominalHoursOf } from '#lib/acoustics/dayEveningNight';
import { addDays, startOfDaySec } from '#lib/time/zone';
import { periodsOf } from '#lib/time/periods';
import { readJson } from './support/fixtures';

interface ClockChange {
  local_date: string;
  local_midnight_utc: string;
  next_midnight_utc: string;
  minutes_expected: number;
  day_07_19_h: number;
  evening_19_23_h: number;
  night_starting_previous_evening_23_07_h: number;
  night_starting_this_evening_23_07_h: number;
}

/** IANA tz database 2025b through python zoneinfo (fixtures/reference/dst.json). */
const { cases } = readJson<{ cases: Record<string, ClockChange[]> }>('reference/dst.json');
const changes = Object.entries(cases).flatMap(([zone, list]) => list.map((change) => ({ zone, ...change })));

function hoursOf(date: string, zone: string): Record<string, number> {
  return Object.fromEntries(
    periodsOf(date, DEFAULT_SCHEME, zone).map((period) => [
      period.kind,
      (period.toSec - period.fromSec) / 3600,
    ]),
  );
}

describe('days and periods at clock changes (fixtures/reference/dst.json)', () => {
  test('the file has London, Copenhagen, New York and Lord Howe', () => expect(changes).toHaveLength(24));

  test.each(changes)('$zone $local_date', (change) => {
    const { zone, local_date: date } = change;
    const fromSec = startOfDaySec(date, zone);
    const toSec = startOfDaySec(addDays(date, 1), zone);
    expect(fromSec).toBe(Date.parse(change.local_midnight_utc) / 1000);
    expect(toSec).toBe(Date.parse(change.next_midnight_utc) / 1000);
    expect((toSec - fromSec) / 60).toBe(change.minutes_expected);
    expect(hoursOf(date, zone)).toEqual({
      day: change.day_07_19_h,
      evening: change.evening_19_23_h,
      night: change.night_starting_this_evening_23_07_h,
    });
    // The night that holds the change belongs to the date before.
    expect(hoursOf(addDays(date, -1), zone)['night']).toBe(change.night_starting_previous_evening_23_07_h);
  });

  test('the weights of Lden stay nominal: a constant level gives what it always gives', () => {
    expect(nominalHoursOf(DEFAULT_SCHEME)).toEqual({ day: 12, evening: 4, night: 8 });
    expect(ldenDb(DEFAULT_SCHEME, { day: 60, evening: 60, night: 60 })).toBeCloseTo(66.3952, 4);
  });
});
