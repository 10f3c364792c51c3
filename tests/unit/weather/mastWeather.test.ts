import { expect, test } from 'vitest';
import { meanWind, weatherDuring, type WeatherRecord } from '#lib/acoustics/mastWeather';
import { invalidityReasons, isValid } from '#lib/acoustics/validity';

const record = (startSec: number, windSpeedMs: number, more: Partial<WeatherRecord> = {}): WeatherRecord => ({
  startSec,
  durationSec: 60,
  windSpeedMs,
  windDirectionDeg: null,
  rainMm: null,
  ...more,
});

test('records that overlap an interval are averaged by duration', () => {
  const records = [record(0, 2), record(60, 8, { rainMm: 0.2 })];
  expect(weatherDuring(records, 0, 60, 900)).toEqual({ windSpeedMs: 2, isRaining: false });
  expect(weatherDuring(records, 40, 100, 900)).toEqual({ windSpeedMs: 6, isRaining: true });
});

test('where none overlaps the nearest within the age speaks, the earlier of two as near; else nothing is known', () => {
  const records = [record(0, 2), record(1000, 8)];
  expect(weatherDuring(records, 100, 160, 900)?.windSpeedMs).toBe(2);
  expect(weatherDuring(records, 900, 960, 900)?.windSpeedMs).toBe(8);
  expect(weatherDuring(records, 500, 560, 900)?.windSpeedMs).toBe(2);
  expect(weatherDuring(records, 500, 560, 440)).toBeNull();
  expect(weatherDuring([], 0, 60, 900)).toBeNull();
});

test('the direction is that of the mean vector: north by way of 350 and 10 degrees', () => {
  const wind = meanWind([record(0, 4, { windDirectionDeg: 350 }), record(60, 4, { windDirectionDeg: 10 })], {
    fromSec: 0,
    toSec: 120,
  });
  expect(wind).toMatchObject({ seconds: 120, directionDeg: 0 });
  expect(wind?.meanSpeedMs).toBeCloseTo(4, 9);
  const opposed = [record(0, 4, { windDirectionDeg: 90 }), record(60, 4, { windDirectionDeg: 270 })];
  expect(meanWind(opposed, { fromSec: 0, toSec: 120 })?.directionDeg).toBeNull();
  expect(meanWind([], { fromSec: 0, toSec: 120 })).toBeNull();
});

test('a mast decides only where the station’s own sensor is silent', () => {
  const rules = { maximumWindSpeedMs: 5, excludeRain: true };
  const mast = { windSpeedMs: 7, isRaining: true };
  const silent = { flags: 0, windSpeedMs: null, mast };
  expect(invalidityReasons(silent, rules, false)).toEqual(['mast-wind', 'mast-rain']);
  expect(isValid(silent, rules, false)).toBe(false);
  const calm = { flags: 0, windSpeedMs: 2, mast };
  expect(invalidityReasons(calm, rules, false)).toEqual([]);
  expect(isValid(calm, rules, false)).toBe(true);
  const unknown = { flags: 0, windSpeedMs: null, mast: null };
  expect(isValid(unknown, rules, false)).toBe(true);
  expect(
    isValid({ ...silent, mast: { ...mast, windSpeedMs: 5 } }, { ...rules, excludeRain: false }, false),
  ).toBe(true);
});
