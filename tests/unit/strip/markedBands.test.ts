import { describe, expect, it } from 'vitest';
import { aWeightOfBandDb } from '#lib/acoustics/weighting';
import { markedBands, type SlipFigures } from '../../../src/components/strip/model/slipFigures';
import { NINE_THIRDS } from './columns';

const figures = (levelsDb: readonly (number | null)[]): SlipFigures => ({
  isEstimate: true,
  expectedSec: 60,
  validSec: 60,
  meetsMinimum: null,
  laeqDb: 50,
  lafmaxDb: 60,
  la10Db: null,
  la90Db: null,
  sampleSec: null,
  bands: NINE_THIRDS.map((band, at) => ({ band, leqDb: levelsDb[at] ?? null, l10Db: null, l90Db: null })),
});
const rectangle = (lowestIndex: number, highestIndex: number) => ({
  fromSec: 0,
  toSec: 60,
  bands: { fraction: 3 as const, lowestIndex, highestIndex },
});
const lowest = NINE_THIRDS[0]?.index ?? NaN;
const highest = NINE_THIRDS[8]?.index ?? NaN;

describe('the bands of a rectangle', () => {
  it('sum in energy, and have their share of all', () => {
    const { leqDb, shareZ } = markedBands(figures(NINE_THIRDS.map(() => 50)), rectangle(lowest, lowest + 2));
    expect(leqDb).toBeCloseTo(50 + 10 * Math.log10(3), 9);
    expect(shareZ).toBeCloseTo(3 / 9, 9);
  });

  it('weigh less to the ear the lower they are', () => {
    const levels = NINE_THIRDS.map((_, at) => (at === 0 || at === 8 ? 60 : null));
    const { shareZ, shareA } = markedBands(figures(levels), rectangle(lowest, lowest));
    expect(shareZ).toBeCloseTo(0.5, 9);
    const [low, high] = [lowest, highest].map((index) => 10 ** (aWeightOfBandDb(index) / 10));
    expect(shareA).toBeCloseTo((low ?? NaN) / ((low ?? NaN) + (high ?? NaN)), 9);
  });

  it('have no level where one of them has none', () => {
    const levels = NINE_THIRDS.map((_, at) => (at === 1 ? null : 50));
    expect(markedBands(figures(levels), rectangle(lowest, lowest + 2))).toEqual({
      leqDb: null,
      shareZ: null,
      shareA: null,
    });
  });
});
