import { describe, expect, test } from 'vitest';
import { bandRange, bandAt } from '#lib/acoustics/bands';
import { standingOut } from '#lib/acoustics/standingOut';
import { levelFromBandsDb } from '#lib/acoustics/weighting';

const bands = bandRange(3, 100, 1000);
const flat = bands.map(() => 50);

function withLevels(levelsByHz: Record<number, number>): number[] {
  return bands.map((band, i) => levelsByHz[band.nominalHz] ?? flat[i] ?? NaN);
}

describe('what stands out of a spectrum', () => {
  test('nothing of a flat one', () => {
    const found = standingOut({ fraction: 3, bands, levelsDb: flat, usualDb: flat, averagedSec: 900 });
    expect(found).toEqual({ tonality: { kind: 'assessed', findings: [] }, ranges: [] });
  });

  test('a tone: a range from edge to edge, its excess, its share of the A-weighted energy', () => {
    const levelsDb = withLevels({ 250: 70 });
    const [range, ...others] = standingOut({
      fraction: 3,
      bands,
      levelsDb,
      usualDb: flat,
      averagedSec: 900,
    }).ranges;
    expect(others).toEqual([]);
    expect(range).toMatchObject({
      lowerIndex: -6,
      upperIndex: -6,
      reasons: ['tone', 'above-usual'],
      levelDb: 70,
    });
    expect([range?.fromHz, range?.toHz]).toEqual([bandAt(3, -6).lowerHz, bandAt(3, -6).upperHz]);
    expect(range?.excessOverNeighboursDb).toBeCloseTo(20, 9);
    expect(range?.excessOverUsualDb).toBeCloseTo(20, 9);
    const aLevelDb = levelFromBandsDb([70], [bandAt(3, -6)], 'A') ?? NaN;
    const aWholeDb = levelFromBandsDb(levelsDb, bands, 'A') ?? NaN;
    expect(range?.aShare).toBeCloseTo(10 ** ((aLevelDb - aWholeDb) / 10), 9);
  });

  test('a tone on an edge is one range of two bands', () => {
    const [range] = standingOut({
      fraction: 3,
      bands,
      levelsDb: withLevels({ 250: 60, 315: 60 }),
      averagedSec: 900,
    }).ranges;
    expect(range).toMatchObject({
      lowerIndex: -6,
      upperIndex: -5,
      reasons: ['tone-on-edge'],
      excessOverUsualDb: null,
    });
    expect(range?.levelDb).toBeCloseTo(63.0103, 4);
  });

  test('louder than both neighbours without being a tone, from 3.0 dB', () => {
    const of = (levelDb: number) =>
      standingOut({ fraction: 3, bands, levelsDb: withLevels({ 500: levelDb }), averagedSec: 900 }).ranges;
    expect(of(52.9)).toEqual([]);
    expect(of(53)).toMatchObject([{ lowerIndex: -3, reasons: ['above-neighbours'] }]);
    expect(of(55)).toMatchObject([{ reasons: ['tone'] }]);
  });

  test('adjacent bands above their usual level are one range', () => {
    const usualDb = withLevels({ 125: 43, 160: 44, 200: 43, 630: 45, 800: 45, 1000: 45.1 });
    const { ranges } = standingOut({ fraction: 3, bands, levelsDb: flat, usualDb, averagedSec: 900 });
    expect(ranges.map(({ lowerIndex, upperIndex, reasons }) => [lowerIndex, upperIndex, reasons])).toEqual([
      [-9, -7, ['above-usual']],
      [-2, -1, ['above-usual']],
    ]);
    expect(ranges[1]?.excessOverUsualDb).toBeCloseTo(5, 9);
    expect(ranges[0]?.levelDb).toBeCloseTo(50 + 10 * Math.log10(3), 9);
  });

  test('tones come first, then the greater excess', () => {
    const levelsDb = withLevels({ 160: 54, 315: 55, 630: 58 });
    const { ranges } = standingOut({ fraction: 3, bands, levelsDb, averagedSec: 900 });
    expect(ranges.map((range) => [bandAt(3, range.lowerIndex).nominalHz, range.reasons[0]])).toEqual([
      [630, 'tone'],
      [315, 'above-neighbours'],
      [160, 'above-neighbours'],
    ]);
  });

  test('octaves: neighbours are three indices away, tones not assessable', () => {
    const octaves = bandRange(1, 63, 1000);
    const found = standingOut({
      fraction: 1,
      bands: octaves,
      levelsDb: [50, 50, 62, 57, 50],
      usualDb: [50, 50, 50, 50, null],
      averagedSec: 900,
    });
    expect(found.tonality).toEqual({ kind: 'not-assessable', reason: 'octave-bands' });
    expect(found.ranges).toMatchObject([
      {
        lowerIndex: -6,
        reasons: ['above-neighbours', 'above-usual'],
        excessOverNeighboursDb: expect.closeTo(5, 9),
      },
      { lowerIndex: -3, upperIndex: -3, reasons: ['above-usual'] },
    ]);
    expect(found.ranges[0]?.toHz).toBe(bandAt(1, -6).upperHz);
  });

  test('octaves: adjacent ones above their usual level are one range, others are not', () => {
    const { ranges } = standingOut({
      fraction: 1,
      bands: bandRange(1, 63, 1000),
      levelsDb: [50, 50, 50, 50, 50],
      usualDb: [44, 44, 50, 50, 44],
      averagedSec: 900,
    });
    expect(ranges.map((range) => [range.lowerIndex, range.upperIndex])).toEqual([
      [-12, -9],
      [0, 0],
    ]);
    expect(ranges[0]?.levelDb).toBeCloseTo(53.0103, 4);
  });
});
