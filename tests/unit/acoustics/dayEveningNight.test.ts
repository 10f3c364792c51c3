import { describe, expect, test } from 'vitest';
import {
  DEFAULT_SCHEME,
  ldenDb,
  ldnDb,
  nominalHoursOf,
  periodKindsOf,
  schemeProblem,
} from '#lib/acoustics/dayEveningNight';

const noEvening = { dayStartMin: 420, eveningStartMin: null, nightStartMin: 1380 };

describe('day, evening, night', () => {
  test('nominal hours are 24 together, also with starts between the hours', () => {
    expect(nominalHoursOf({ dayStartMin: 390, eveningStartMin: 1110, nightStartMin: 1350 })).toEqual({
      day: 12,
      evening: 4,
      night: 8,
    });
    expect(nominalHoursOf(noEvening)).toEqual({ day: 16, evening: 0, night: 8 });
    expect(periodKindsOf(noEvening)).toEqual(['day', 'night']);
  });

  test('a missing period leaves no Lden; a scheme without evening does not miss it', () => {
    expect(ldenDb(DEFAULT_SCHEME, { day: 60, evening: null, night: 50 })).toBeNull();
    expect(ldenDb(noEvening, { day: 60, evening: null, night: 50 })).toBeCloseTo(60, 9);
    // An evening level that happens to be there does not count in such a scheme.
    expect(ldenDb(noEvening, { day: 60, evening: 99, night: 50 })).toBeCloseTo(60, 9);
    expect(ldnDb({ day: null, night: 50 })).toBeNull();
  });

  test.each([
    [{ dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1140 }],
    [{ dayStartMin: 420, eveningStartMin: 400, nightStartMin: 1140 }],
    [{ dayStartMin: 420, eveningStartMin: null, nightStartMin: 60 }],
    [{ dayStartMin: 420, eveningStartMin: null, nightStartMin: 1440 }],
    [{ dayStartMin: -1, eveningStartMin: null, nightStartMin: 1380 }],
    [{ dayStartMin: 420.5, eveningStartMin: null, nightStartMin: 1380 }],
  ])('%o is no scheme', (scheme) => expect(schemeProblem(scheme)).not.toBeNull());

  test('the default is one', () => expect(schemeProblem(DEFAULT_SCHEME)).toBeNull());
});
