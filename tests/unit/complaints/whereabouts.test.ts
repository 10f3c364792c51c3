import { expect, test } from 'vitest';
import { coarsePlace, distanceInWords, distanceM, windTowards } from '#lib/services/complaints/whereabouts';

test('a degree of latitude is 111.2 km on the sphere of the mean radius', () => {
  expect(distanceM({ latitude: 54, longitude: 1.6 }, { latitude: 55, longitude: 1.6 })).toBeCloseTo(
    111_195,
    -1,
  );
});

test('distances hold across the date line', () => {
  const across = distanceM({ latitude: 0, longitude: 179.99 }, { latitude: 0, longitude: -179.99 });
  expect(across).toBeCloseTo(2224, -1);
});

test.each([
  [54.2, 1.6, 'north'],
  [54.2, 1.77, 'north-east'],
  [54.1, 1.9, 'east'],
  [54.0, 1.43, 'south-west'],
  [54.1, 1.3, 'west'],
] as const)('towards %f, %f', (latitude, longitude, wind) => {
  expect(windTowards({ latitude: 54.1, longitude: 1.6 }, { latitude, longitude })).toBe(wind);
});

test.each([
  [10, 'at that very place'],
  [352, 'about 350 m'],
  [974, 'about 950 m'],
  [990, 'about 1.0 km'],
  [1240, 'about 1.2 km'],
])('%f m in words', (metres, words) => {
  expect(distanceInWords(metres)).toBe(words);
});

test('the coarse place is rounded to a hundredth of a degree', () => {
  expect(coarsePlace({ latitude: 54.10499, longitude: -1.60501 })).toEqual({
    latitude: 54.1,
    longitude: -1.61,
  });
});
