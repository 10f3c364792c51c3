import { describe, expect, test } from 'vitest';
import { bandRange } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import {
  adjacentPairTones,
  assessTonality,
  surveyTones,
  thirdsTenthsOfCentiDb,
  thirdsTenthsOfDb,
  tonalThresholdTenths,
} from '#lib/acoustics/tonality';
import { thirdIndices } from './support/intervals';

function spectrum(firstHz: number, levelsDb: (number | null)[]) {
  const bands = bandRange(3, firstHz, 20000).slice(0, levelsDb.length);
  return thirdsTenthsOfDb(levelsDb, bands);
}

describe('survey method', () => {
  test('thresholds by the band under test; none below 25 Hz and above 10 kHz', () => {
    const thresholds = bandRange(3, 12.5, 20000).map((band) => tonalThresholdTenths(band.index));
    expect(thresholds).toEqual([
      ...new Array<null>(3).fill(null),
      ...new Array<number>(8).fill(150),
      ...new Array<number>(5).fill(80),
      ...new Array<number>(14).fill(50),
      ...new Array<null>(3).fill(null),
    ]);
  });

  test('the first and last measured band, and one beside a gap, are never tonal', () => {
    expect(surveyTones(spectrum(1000, [80, 40, 40, 40, 80]))).toEqual([]);
    expect(surveyTones(spectrum(1000, [40, 80, null, 40, 40]))).toEqual([]);
    expect(surveyTones(spectrum(1000, [40, 80, 40]))).toHaveLength(1);
  });

  test('stored levels are rounded half up to tenths before they are compared', () => {
    const indices = thirdIndices(800, 1250);
    const at = (centiDb: number) =>
      surveyTones(thirdsTenthsOfCentiDb(Int16Array.from([4000, centiDb, 4000]), indices));
    expect(at(4494)).toEqual([]);
    expect(at(4495)).toMatchObject([{ lowerIndex: 0, excessTenths: 50 }]);
    expect(thirdsTenthsOfCentiDb(Int16Array.from([4000, NO_LEVEL_CENTI_DB, 4000]), indices)[19]).toBeNull();
  });

  test('the excess is over the louder neighbour', () => {
    expect(surveyTones(spectrum(1000, [40, 60, 52]))).toMatchObject([
      { excessTenths: 80, thresholdTenths: 50 },
    ]);
  });
});

describe('adjacent pairs', () => {
  test('a tone on the edge of 200 and 250 Hz: 8 dB over both outer neighbours', () => {
    const found = adjacentPairTones(spectrum(160, [50, 55, 55, 50]));
    expect(found).toEqual([
      { method: 'adjacent-pair', lowerIndex: -7, upperIndex: -6, excessTenths: 80, thresholdTenths: 80 },
    ]);
    expect(adjacentPairTones(spectrum(160, [50, 54.9, 54.9, 50]))).toEqual([]);
  });

  test('the lower band’s threshold holds where they differ', () => {
    // 125 and 160 Hz: 15 dB, although 160 Hz alone would need 8.
    expect(adjacentPairTones(spectrum(100, [50, 61, 61, 50]))).toEqual([]);
    expect(adjacentPairTones(spectrum(100, [50, 62, 62, 50]))).toMatchObject([
      { lowerIndex: -9, thresholdTenths: 150 },
    ]);
  });

  test('a band that the survey method finds is left to it', () => {
    const tone = spectrum(160, [50, 52, 70, 50, 50]);
    expect(surveyTones(tone)).toMatchObject([{ lowerIndex: -6 }]);
    expect(adjacentPairTones(tone)).toEqual([]);
  });

  test('of overlapping pairs the one that stands out most remains', () => {
    const found = adjacentPairTones(spectrum(800, [40, 47, 50, 48, 40]));
    expect(found).toHaveLength(1);
    expect(found[0]).toMatchObject({ lowerIndex: 1, upperIndex: 2 });
  });

  test('pairs at the ends of the range, or beside a gap, are not tested', () => {
    expect(adjacentPairTones(spectrum(10000, [40, 70, 70, 40]))).toEqual([]);
    expect(adjacentPairTones(spectrum(1000, [70, 70, 40, 40]))).toEqual([]);
    expect(adjacentPairTones(spectrum(1000, [null, 70, 70, 40]))).toEqual([]);
  });
});

test('an assessment gives both methods in order of frequency, or why there is none', () => {
  const bands = bandRange(3, 160, 1600);
  const levelsDb = [50, 60, 60, 50, 50, 50, 50, 50, 60, 50, 50];
  expect(assessTonality(3, levelsDb, bands, 900)).toMatchObject({
    kind: 'assessed',
    findings: [
      { method: 'adjacent-pair', lowerIndex: -7 },
      { method: 'survey', lowerIndex: 0 },
    ],
  });
  expect(assessTonality(3, levelsDb, bands, 10)).toEqual({
    kind: 'not-assessable',
    reason: 'averaged-too-short',
  });
  const scattered = levelsDb.map((levelDb, i) => (i % 2 === 0 ? levelDb : null));
  expect(assessTonality(3, scattered, bands, 900)).toEqual({
    kind: 'not-assessable',
    reason: 'no-neighbours',
  });
  expect(
    assessTonality(
      3,
      bands.map(() => 50),
      bands,
      900,
    ),
  ).toEqual({ kind: 'assessed', findings: [] });
});
