import { expect, test } from 'vitest';
import {
  addWind,
  countsInWind,
  isDismissed,
  noWind,
  windPlace,
  type WindRule,
} from '#lib/acoustics/windRule';
import { windRuleText } from '#lib/format/windRule';

const NONE: WindRule = {
  minimumMs: null,
  maximumMs: null,
  fromDeg: null,
  toDeg: null,
  dismissAboveMs: null,
  unknown: 'left-out',
};

test.each([
  [0.9, 'outside'],
  [1, 'within'],
  [5, 'within'],
  [5.01, 'outside'],
  [null, 'unknown'],
] as const)('a wind of %s m/s against 1 to 5 m/s: %s', (speedMs, place) => {
  expect(windPlace({ ...NONE, minimumMs: 1, maximumMs: 5 }, { speedMs, directionDeg: null })).toBe(place);
});

test.each([
  [315, 'within'],
  [0, 'within'],
  [45, 'within'],
  [46, 'outside'],
  [314, 'outside'],
  [null, 'unknown'],
] as const)('wind from %s° against a sector across north: %s', (directionDeg, place) => {
  expect(windPlace({ ...NONE, fromDeg: 315, toDeg: 45 }, { speedMs: null, directionDeg })).toBe(place);
});

test('what is outside by its speed is outside though its direction is not known', () => {
  const rule = { ...NONE, maximumMs: 5, fromDeg: 0, toDeg: 90, unknown: 'counts' as const };
  expect(countsInWind(rule, { speedMs: 6, directionDeg: null })).toBe(false);
  expect(countsInWind(rule, { speedMs: 4, directionDeg: null })).toBe(true);
  expect(countsInWind({ ...rule, unknown: 'left-out' }, { speedMs: 4, directionDeg: null })).toBe(false);
});

test('a window is dismissed by its mean wind in tenths, and where too little of it is known as the rule says', () => {
  const rule = { ...NONE, dismissAboveMs: 5 };
  const windOf = (...parts: [speedMs: number | null, seconds: number][]) => {
    const wind = noWind();
    for (const [speedMs, seconds] of parts) addWind(wind, rule, { speedMs, directionDeg: null }, seconds);
    return wind;
  };
  expect(isDismissed(rule, windOf([4, 300], [6, 300]))).toBe(false);
  expect(isDismissed(rule, windOf([4, 300], [6.08, 300]))).toBe(false);
  expect(isDismissed(rule, windOf([4, 300], [6.1, 300]))).toBe(true);
  expect(isDismissed(rule, windOf([9, 300], [null, 301]))).toBe(true);
  expect(isDismissed({ ...rule, unknown: 'counts' }, windOf([9, 300], [null, 301]))).toBe(false);
  expect(isDismissed({ ...rule, unknown: 'counts' }, windOf([9, 301], [null, 300]))).toBe(true);
  expect(isDismissed(NONE, windOf([9, 600]))).toBe(false);
});

test('a rule is told in words', () => {
  expect(windRuleText({ ...NONE, maximumMs: 5, fromDeg: 315, toDeg: 45, dismissAboveMs: 6 })).toBe(
    'only wind of at most 5.0 m/s from 315° clockwise to 45° counts; not compared when the mean wind is above 6.0 m/s; ' +
      'intervals with unknown wind do not count; windows with less than half of it known are not compared',
  );
  expect(windRuleText({ ...NONE, dismissAboveMs: 5, unknown: 'counts' })).toBe(
    'not compared when the mean wind is above 5.0 m/s; unknown wind counts as fitting',
  );
});
