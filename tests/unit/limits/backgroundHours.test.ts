import { expect, test } from 'vitest';
import type { NetworkSettings } from '#db/queries/networks';
import { backgroundHoursOf } from '#lib/services/limits/backgroundHours';

const TIMELINE: NetworkSettings[] = [
  {
    effectiveFromSec: 0,
    timeZone: 'Europe/London',
    scheme: { dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1380 },
    minimumCoverage: 0.75,
    rules: { maximumWindSpeedMs: 5, excludeRain: false },
  },
];
const sec = (instant: string) => Date.parse(instant) / 1000;

/** Hours from and to, a window's beginning, and the hours that it looks back at. */
test.each([
  ['23:00', '05:00', '2026-06-10T12:00+01:00', '2026-06-09T23:00+01:00', '2026-06-10T05:00+01:00'],
  // The night that goes on is not over yet, and the one that ends with the window's beginning is.
  ['23:00', '05:00', '2026-06-10T03:00+01:00', '2026-06-08T23:00+01:00', '2026-06-09T05:00+01:00'],
  ['23:00', '05:00', '2026-06-10T05:00+01:00', '2026-06-09T23:00+01:00', '2026-06-10T05:00+01:00'],
  ['12:00', '13:00', '2026-06-10T12:30+01:00', '2026-06-09T12:00+01:00', '2026-06-09T13:00+01:00'],
  // Five hours of the clock are four where it is put forward, and six where it is put back.
  ['00:00', '05:00', '2026-03-29T12:00+01:00', '2026-03-29T00:00+00:00', '2026-03-29T05:00+01:00'],
  ['00:00', '05:00', '2026-10-25T12:00+00:00', '2026-10-25T00:00+01:00', '2026-10-25T05:00+00:00'],
  // An hour that the clock skips is passed over.
  ['01:00', '02:00', '2026-03-29T12:00+01:00', '2026-03-28T01:00+00:00', '2026-03-28T02:00+00:00'],
])('%s to %s before a window of %s', (from, to, window, fromInstant, toInstant) => {
  const minutes = (clock: string) => Number(clock.slice(0, 2)) * 60 + Number(clock.slice(3));
  const rule = {
    metric: 'LAeqLessLA90',
    backgroundFromMin: minutes(from),
    backgroundToMin: minutes(to),
  } as const;
  expect(backgroundHoursOf(rule, sec(window), TIMELINE)).toEqual({
    fromSec: sec(fromInstant),
    toSec: sec(toInstant),
  });
});

test('a limit on another quantity has none', () => {
  const rule = { metric: 'LAeq', backgroundFromMin: 0, backgroundToMin: 60 } as const;
  expect(backgroundHoursOf(rule, sec('2026-06-10T12:00Z'), TIMELINE)).toBeNull();
});
