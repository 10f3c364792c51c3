import { type Band } from './bands';

/** Which edition's NC curves: they differ by 1 dB in several places, so name it wherever a rating is shown. */
export type NcEdition = 'Beranek 1957' | 'ANSI/ASA S12.2-2019';

interface NcTable {
  bandIndices: readonly number[];
  /** Levels in dB by octave for NC 15, 20, … 70. */
  curvesDb: readonly (readonly number[])[];
}

const LOWEST_NC = 15;
const HIGHEST_NC = 70;
const NC_STEP = 5;

/** Octaves 63 Hz–8 kHz; values as in python-acoustics' criterion module and other public text (reference/nr.json). */
const BERANEK_1957: NcTable = {
  bandIndices: [-12, -9, -6, -3, 0, 3, 6, 9],
  curvesDb: [
    [47, 36, 29, 22, 17, 14, 12, 11],
    [51, 40, 33, 26, 22, 19, 17, 16],
    [54, 44, 37, 31, 27, 24, 22, 21],
    [57, 48, 41, 35, 31, 29, 28, 27],
    [60, 52, 45, 40, 36, 34, 33, 32],
    [64, 56, 50, 45, 41, 39, 38, 37],
    [67, 60, 54, 49, 46, 44, 43, 42],
    [71, 64, 58, 54, 51, 49, 48, 47],
    [74, 67, 62, 58, 56, 54, 53, 52],
    [77, 71, 67, 63, 61, 59, 58, 57],
    [80, 75, 71, 68, 66, 64, 63, 62],
    [83, 79, 75, 72, 71, 70, 69, 68],
  ],
};

/** Octaves 16 Hz–8 kHz, Table 1 as in phonometry's noise_criteria module (secondary; reference/nr.json). */
const S12_2_2019: NcTable = {
  bandIndices: [-18, -15, -12, -9, -6, -3, 0, 3, 6, 9],
  curvesDb: [
    [78, 61, 47, 36, 28, 22, 18, 14, 12, 11],
    [79, 63, 50, 40, 33, 26, 22, 20, 17, 16],
    [80, 65, 54, 44, 37, 31, 27, 24, 22, 22],
    [81, 68, 57, 48, 41, 35, 32, 29, 28, 27],
    [82, 71, 60, 52, 45, 40, 36, 34, 33, 32],
    [84, 74, 64, 56, 50, 44, 41, 39, 38, 37],
    [85, 76, 67, 60, 54, 49, 46, 44, 43, 42],
    [87, 79, 71, 64, 58, 54, 51, 49, 48, 47],
    [89, 82, 74, 67, 62, 58, 56, 54, 53, 52],
    [90, 85, 77, 71, 66, 63, 60, 59, 58, 57],
    [90, 88, 80, 75, 71, 68, 65, 64, 63, 62],
    [90, 90, 84, 79, 75, 72, 71, 70, 68, 68],
  ],
};

const TABLES: Readonly<Record<NcEdition, NcTable>> = {
  'Beranek 1957': BERANEK_1957,
  'ANSI/ASA S12.2-2019': S12_2_2019,
};

/** The NC rating of an octave spectrum. Outside the curves, NC 15–70, there is only a bound. */
export interface NoiseCriterion {
  edition: NcEdition;
  kind: 'rated' | 'below-curves' | 'above-curves';
  /** Interpolated between curves; 15 when below all of them, 70 when above all. */
  nc: number;
  /** Band index of the octave that decides. */
  governingIndex: number;
  /** Some octave of the edition is missing: the rating is "at least" this. */
  isAtLeast: boolean;
  /** −∞ below all curves, +∞ above. */
  perBand: { bandIndex: number; nc: number }[];
}

/** Rating of one level between curves, −∞ and +∞ outside. Where two curves coincide the lower one counts. */
function ncOfLevel(levelDb: number, curveLevelsDb: readonly number[]): number {
  const above = curveLevelsDb.findIndex((curveDb) => levelDb <= curveDb);
  if (above === -1) return Infinity;
  const upperDb = curveLevelsDb[above] ?? NaN;
  if (above === 0) return levelDb === upperDb ? LOWEST_NC : -Infinity;
  const lowerDb = curveLevelsDb[above - 1] ?? NaN;
  return LOWEST_NC + NC_STEP * (above - 1 + (levelDb - lowerDb) / (upperDb - lowerDb));
}

/**
 * NC rating of unweighted octave levels in dB by the tangent method: the highest over the edition's octaves, interpolated
 * between curves, with the octave that governs. Null when none has a level. NC is meant for rooms.
 */
export function noiseCriterion(
  levelsDb: readonly (number | null)[],
  octaves: readonly Pick<Band, 'index'>[],
  edition: NcEdition,
): NoiseCriterion | null {
  const { bandIndices, curvesDb } = TABLES[edition];
  const levelOf = new Map(octaves.map((band, i) => [band.index, levelsDb[i] ?? null]));
  const perBand = bandIndices.flatMap((bandIndex, column) => {
    const levelDb = levelOf.get(bandIndex) ?? null;
    if (levelDb === null) return [];
    return [
      {
        bandIndex,
        nc: ncOfLevel(
          levelDb,
          curvesDb.map((curve) => curve[column] ?? NaN),
        ),
      },
    ];
  });
  const [first, ...rest] = perBand;
  if (!first) return null;
  const governing = rest.reduce((highest, band) => (band.nc > highest.nc ? band : highest), first);
  return {
    edition,
    kind: kindOf(governing.nc),
    nc: Math.min(HIGHEST_NC, Math.max(LOWEST_NC, governing.nc)),
    governingIndex: governing.bandIndex,
    isAtLeast: perBand.length < bandIndices.length,
    perBand,
  };
}

function kindOf(nc: number): NoiseCriterion['kind'] {
  if (Number.isFinite(nc)) return 'rated';
  return nc < 0 ? 'below-curves' : 'above-curves';
}
