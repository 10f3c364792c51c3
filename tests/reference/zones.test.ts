import { Temporal } from '@js-temporal/polyfill';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { isRepeatedHour } from '#lib/time/clockChange';
import { hoursOfDay, instantAtSec, localDateAt, localMinuteAt, startOfDaySec } from '#lib/time/zone';

/**
 * Civil time against the reference implementation of ECMAScript's Temporal, a second reading of the platform's IANA zones.
 */
const ZONES = [
  'Europe/London',
  'Europe/Dublin',
  'America/New_York',
  'America/St_Johns',
  'America/Sao_Paulo',
  'Africa/Casablanca',
  'Asia/Kathmandu',
  'Asia/Tehran',
  'Australia/Lord_Howe',
  'Australia/Adelaide',
  'Pacific/Chatham',
  'Pacific/Apia',
  'UTC',
];

const zones = fc.constantFrom(...ZONES);
const secs = fc.integer({ min: Date.UTC(2005, 0, 1) / 1000, max: Date.UTC(2036, 11, 31) / 1000 });
const zoned = (sec: number, zone: string) =>
  Temporal.Instant.fromEpochMilliseconds(sec * 1000).toZonedDateTimeISO(zone);
const secOf = (time: Temporal.ZonedDateTime) => time.epochMilliseconds / 1000;

test('civil date, clock and length of a day agree with Temporal', () => {
  fc.assert(
    fc.property(secs, zones, (sec, zone) => {
      const there = zoned(sec, zone);
      const date = there.toPlainDate().toString();
      expect(localDateAt(sec, zone)).toBe(date);
      expect(localMinuteAt(sec, zone)).toBe(there.hour * 60 + there.minute);
      expect(startOfDaySec(date, zone)).toBe(secOf(there.startOfDay()));
      expect(hoursOfDay(date, zone)).toBe(there.hoursInDay);
    }),
    { numRuns: 400 },
  );
});

test('an instant named by date and clock is Temporal’s, at skipped and repeated hours too', () => {
  fc.assert(
    fc.property(
      secs,
      zones,
      fc.integer({ min: 0, max: 1439 }),
      fc.boolean(),
      (sec, zone, minute, atChange) => {
        const change = atChange ? zoned(sec, zone).getTimeZoneTransition('next') : null;
        const date = (change ?? zoned(sec, zone)).toPlainDate();
        const clock = date.toPlainDateTime({ hour: Math.floor(minute / 60), minute: minute % 60 });
        const expected = clock.toZonedDateTime(zone, { disambiguation: 'compatible' });
        expect(instantAtSec(date.toString(), minute, zone), `${clock.toString()} ${zone}`).toBe(
          secOf(expected),
        );
      },
    ),
    { numRuns: 600 },
  );
});

test('a clock time that comes twice is known as one on both occasions, and no other is', () => {
  fc.assert(
    fc.property(secs, zones, fc.integer({ min: -7200, max: 7200 }), (sec, zone, aside) => {
      const change = zoned(sec, zone).getTimeZoneTransition('next');
      const near = (change ? secOf(change) : sec) + aside;
      const shown = zoned(near, zone).toPlainDateTime();
      const [first, second] = (['earlier', 'later'] as const).map(
        (disambiguation) => shown.toZonedDateTime(zone, { disambiguation }).epochMilliseconds,
      );
      expect(isRepeatedHour(near, zone), `${shown.toString()} ${zone}`).toBe(first !== second);
    }),
    { numRuns: 600 },
  );
});
