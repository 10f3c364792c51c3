import { describe, expect, test } from 'vitest';
import { bandByNominalHz, bandAt } from '#lib/acoustics/bands';
import { noiseCriterion, type NcEdition } from '#lib/acoustics/noiseCriterion';
import { noiseRating, NR_BAND_INDICES, nrCurveDb } from '#lib/acoustics/noiseRating';
import { ACTION_VALUES, actionValuesReached, nioshHours } from '#lib/acoustics/occupational';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { present, readJson } from './support/fixtures';

type Spectrum = Record<string, number>;
interface NcWorked {
  per_band: Spectrum;
  governing_hz: number;
  NC: number;
}
interface NcTable {
  bands_hz: number[];
  table: Record<string, number[]>;
}
interface RatingsFile {
  NR: {
    bands_hz: number[];
    table_0_130: { NR: number; exact: number[] }[];
    worked: [NrWorked, NrWorked, { spectrum: string; expect: number }];
  };
  NC: {
    classic_Beranek_1957: NcTable;
    ANSI_ASA_S12_2_2019_Table_1: NcTable;
    worked: { source: string; spectrum: Spectrum; classic: NcWorked; 'S12.2-2019': NcWorked };
  };
  occupational: {
    EU_2003_10_EC_Art3: Record<
      'lower_action' | 'upper_action' | 'limit_with_protectors',
      { LEX8h: number; dBC: number }
    >;
    NIOSH: { table: Spectrum };
  };
}
interface NrWorked {
  spectrum: Spectrum;
  per_band: Spectrum;
  governing_hz: number;
  NR_exact: number;
  NR_next_integer: number;
}

const file = readJson<RatingsFile>('reference/nr.json');

function octavesOf(spectrum: Spectrum) {
  return Object.keys(spectrum).map((hz) => present(bandByNominalHz(1, Number(hz)), `octave ${hz}`));
}

describe('NR (ISO/R 1996:1971; constants AS 1469-1983, Bies & Hansen; fixtures/reference/nr.json)', () => {
  test.each(file.NR.table_0_130)('curve NR $NR', ({ NR, exact }) => {
    const octaves = NR_BAND_INDICES.map((index) => bandAt(1, index));
    expect(octaves.map((octave) => octave.nominalHz)).toEqual(file.NR.bands_hz);
    exact.forEach((levelDb, i) => {
      expect(nrCurveDb(NR, present(NR_BAND_INDICES[i]))).toBeCloseTo(levelDb, 9);
    });
    // A spectrum exactly on a curve is that curve, not the next.
    const onCurve = noiseRating(exact, octaves);
    expect(onCurve?.nr).toBe(NR);
    expect(onCurve?.isAtLeast).toBe(false);
  });

  test.each(file.NR.worked.slice(0, 2) as NrWorked[])(
    'worked example governed by $governing_hz Hz',
    (wanted) => {
      const rating = present(noiseRating(Object.values(wanted.spectrum), octavesOf(wanted.spectrum)));
      for (const { bandIndex, nr } of rating.perBand) {
        expect(roundHalfUp(nr, 2)).toBe(wanted.per_band[String(bandAt(1, bandIndex).nominalHz)]);
      }
      expect(bandAt(1, rating.governingIndex).nominalHz).toBe(wanted.governing_hz);
      expect(roundHalfUp(rating.exact, 2)).toBe(wanted.NR_exact);
      expect(rating.nr).toBe(wanted.NR_next_integer);
    },
  );

  test('exactly the NR 35 curve is NR 35', () => {
    const octaves = NR_BAND_INDICES.map((index) => bandAt(1, index));
    const levelsDb = NR_BAND_INDICES.map((index) => nrCurveDb(35, index));
    expect(noiseRating(levelsDb, octaves)?.nr).toBe(file.NR.worked[2].expect);
  });

  test('with an octave missing the rating is "at least"; without any there is none', () => {
    const [wanted] = file.NR.worked;
    const octaves = octavesOf(wanted.spectrum);
    const levelsDb = Object.entries(wanted.spectrum).map(([hz, levelDb]) => (hz === '500' ? null : levelDb));
    const rating = present(noiseRating(levelsDb, octaves));
    expect(rating).toMatchObject({ isAtLeast: true, nr: 38, governingIndex: 0 });
    expect(
      noiseRating(
        octaves.map(() => null),
        octaves,
      ),
    ).toBeNull();
  });
});

describe('NC (tables by edition, fixtures/reference/nr.json)', () => {
  const editions: [NcEdition, NcTable, NcWorked][] = [
    ['Beranek 1957', file.NC.classic_Beranek_1957, file.NC.worked.classic],
    ['ANSI/ASA S12.2-2019', file.NC.ANSI_ASA_S12_2_2019_Table_1, file.NC.worked['S12.2-2019']],
  ];

  test.each(editions)('%s: Crocker & Arenas example 6.3, NC 46 at 500 Hz', (edition, _, wanted) => {
    const { spectrum } = file.NC.worked;
    const rating = present(noiseCriterion(Object.values(spectrum), octavesOf(spectrum), edition));
    for (const { bandIndex, nc } of rating.perBand) {
      expect(nc).toBeCloseTo(present(wanted.per_band[String(bandAt(1, bandIndex).nominalHz)]), 9);
    }
    expect(rating).toMatchObject({ edition, kind: 'rated', nc: wanted.NC });
    expect(bandAt(1, rating.governingIndex).nominalHz).toBe(wanted.governing_hz);
    // The later edition also has 16 and 31.5 Hz, which this spectrum lacks.
    expect(rating.isAtLeast).toBe(edition !== 'Beranek 1957');
  });

  test.each(editions)('%s: every curve rates as itself', (edition, { table, bands_hz }) => {
    const octaves = bands_hz.map((hz) => present(bandByNominalHz(1, hz)));
    expect(Object.keys(table)).toHaveLength(12);
    for (const [nc, levelsDb] of Object.entries(table)) {
      expect(noiseCriterion(levelsDb, octaves, edition), `NC ${nc}`).toMatchObject({
        kind: 'rated',
        nc: Number(nc),
      });
    }
  });

  test('outside the curves there is only a bound', () => {
    const [octave] = [bandAt(1, 0)];
    expect(noiseCriterion([10], [octave], 'Beranek 1957')).toMatchObject({ kind: 'below-curves', nc: 15 });
    expect(noiseCriterion([72], [octave], 'Beranek 1957')).toMatchObject({ kind: 'above-curves', nc: 70 });
  });

  test('the editions differ: 250 Hz of NC 15 is 29 dB in one, 28 dB in the other', () => {
    const octave = bandAt(1, -6);
    expect(noiseCriterion([29], [octave], 'Beranek 1957')?.nc).toBe(15);
    expect(noiseCriterion([29], [octave], 'ANSI/ASA S12.2-2019')?.nc).toBe(16);
  });
});

describe('occupational values (2003/10/EC Article 3, NIOSH; fixtures/reference/nr.json)', () => {
  test('action and limit values', () => {
    const { lower_action, upper_action, limit_with_protectors } = file.occupational.EU_2003_10_EC_Art3;
    const levelOf = (key: string, quantity: string) =>
      ACTION_VALUES.find((value) => value.key === key && value.quantity === quantity)?.levelDb;
    for (const [key, wanted] of [
      ['lower-action', lower_action],
      ['upper-action', upper_action],
      ['limit', limit_with_protectors],
    ] as const) {
      expect(levelOf(key, 'LAeq')).toBe(wanted.LEX8h);
      expect(levelOf(key, 'LCpeak')).toBe(wanted.dBC);
    }
  });

  test('reaching a value counts, on tenths', () => {
    expect(actionValuesReached({ laeqDb: 79.94, lcpeakDb: 134.94 })).toEqual([]);
    expect(actionValuesReached({ laeqDb: 79.95, lcpeakDb: null }).map((value) => value.key)).toEqual([
      'lower-action',
    ]);
    expect(actionValuesReached({ laeqDb: null, lcpeakDb: 140 }).map((value) => value.key)).toEqual([
      'lower-action',
      'upper-action',
      'limit',
    ]);
    expect(actionValuesReached({ laeqDb: null, lcpeakDb: null })).toEqual([]);
  });

  test.each(Object.entries(file.occupational.NIOSH.table))('NIOSH: %s dB(A) for %s h', (levelDb, hours) => {
    expect(nioshHours(Number(levelDb))).toBeCloseTo(hours, 12);
  });
});
