import { describe, expect, it } from 'vitest';
import { aWeightOfBandDb } from '#lib/acoustics/weighting';
import { readBandView } from '#lib/services/figures/bandView';
import { bandHourRows, loudestBandHour } from '../../../src/components/figures/bandHourCells';
import { nrComparison } from '../../../src/components/figures/nrComparison';

describe('an NR curve over octaves', () => {
  const octaves = [
    { nominalHz: 16, Leq: 80 },
    { nominalHz: 63, Leq: 67.1 },
    { nominalHz: 1000, Leq: 35 },
  ];

  it('names the octave that governs and how far it lies above the curve', () => {
    const { rating, curveDb, governingHz, governingDifferenceDb } = nrComparison(octaves, 35);
    // 35.5 + 0.79 · 40 = 67.1.
    expect(rating).toMatchObject({ nr: 40, isAtLeast: true });
    expect(governingHz).toBe(63);
    expect(governingDifferenceDb).toBeCloseTo(0.79 * 5, 9);
    expect(curveDb).toEqual([null, expect.closeTo(63.15, 9), 35]);
  });

  it('has no rating without levels, but a curve all the same', () => {
    const { rating, curveDb } = nrComparison([{ nominalHz: 1000, Leq: null }], 30);
    expect(rating).toBeNull();
    expect(curveDb).toEqual([30]);
  });
});

describe('bands by hour', () => {
  const hour = { hour: 0, coverage: 1, meetsMinimum: true };
  const held = {
    bandFraction: 3 as const,
    bandsHz: [100, 125, 160],
    octavesHz: [125],
    hours: [
      { ...hour, bandsLeq: [60, 50, 40], octavesLeq: [60.5] },
      { ...hour, hour: 1, bandsLeq: [60, null, 70], octavesLeq: [null] },
    ],
  };

  it('are weighted third by third, octaves too', () => {
    const [third] = bandHourRows(held, 3, 'A');
    expect(third?.levelsDb[0]).toBeCloseTo(60 + aWeightOfBandDb(-10), 9);
    const [octave] = bandHourRows(held, 1, 'A');
    const energy = [60, 50, 40].reduce(
      (sum, db, at) => sum + 10 ** ((db + aWeightOfBandDb(at - 10)) / 10),
      0,
    );
    expect(octave?.levelsDb).toEqual([expect.closeTo(10 * Math.log10(energy), 9), null]);
    expect(bandHourRows(held, 1, 'Z')[0]?.levelsDb).toEqual([60.5, null]);
  });

  it('of an octave station are octaves whatever is asked', () => {
    const octaves = { ...held, bandFraction: 1 as const, bandsHz: [125] };
    expect(bandHourRows(octaves, 3, 'A')[0]?.levelsDb[0]).toBeCloseTo(60.5 + aWeightOfBandDb(-9), 9);
  });

  it('tell the loudest', () => {
    expect(loudestBandHour(bandHourRows(held, 3, 'Z'))).toEqual({ label: '160 Hz', hour: 1, levelDb: 70 });
    expect(loudestBandHour([])).toBeNull();
  });
});

describe('the view in the address', () => {
  const read = (query: string) => readBandView(new URLSearchParams(query));

  it('is thirds, unweighted and without a curve unless told otherwise', () => {
    expect(read('').view).toEqual({ nr: null, fraction: 3, weighting: 'Z' });
    expect(read('nr=35&bands=octaves&weighting=A').view).toEqual({ nr: 35, fraction: 1, weighting: 'A' });
  });

  it('keeps what cannot be read and says so', () => {
    for (const nr of ['loud', '131', '-3', '3.5']) {
      const { view, nrText, problem } = read(`nr=${nr}`);
      expect(view.nr).toBeNull();
      expect(nrText).toBe(nr);
      expect(problem).toContain('from 0 to 130');
    }
  });
});
