import { pool, type Connection } from '#db/queries/connection';
import { type StationRow } from '#db/queries/stations';
import { bandAt, bandSlot, bandsOf, type Band, type BandFraction } from '#lib/acoustics/bands';
import { lowFrequencyIndicator } from '#lib/acoustics/lowFrequency';
import { noiseRating } from '#lib/acoustics/noiseRating';
import { octaveIndexOf } from '#lib/acoustics/octaves';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { assessTonality } from '#lib/acoustics/tonality';
import { formatInstantUtc } from '#lib/contracts/common';
import { EXCEEDANCE_PERCENTS, type BandStatistics, type Statistics } from '#lib/contracts/levels';
import { periodFigures, type FiguresQuery, type PeriodFigures } from './figures';

type BandedStation = Pick<
  StationRow,
  'id' | 'networkId' | 'intervalSec' | 'bandFraction' | 'firstBandIndex' | 'lastBandIndex'
>;

export interface StatisticsQuery extends FiguresQuery {
  station: BandedStation;
}

/** Every figure of a station's period as the interface gives it, unrounded. */
export async function periodStatistics(
  query: StatisticsQuery,
  conn: Connection = pool(),
): Promise<Statistics> {
  const figures = await periodFigures(query, { bandPercentiles: true }, conn);
  return statisticsOf(figures, query);
}

/** Figures as the interface gives them. */
export function statisticsOf(
  figures: PeriodFigures,
  { station, validity = 'rules' }: Pick<StatisticsQuery, 'station' | 'validity'>,
): Statistics {
  const { levels, seconds, coverage, minimumCoverage, meetsMinimum } = figures;
  const { sums } = levels;
  const laeqDb = levels.laeqDb();
  const lceqDb = levels.lceqDb();
  const octaves = octavesOf(station, levels).map((band) => octaveStatistics(levels, band));
  return {
    from: formatInstantUtc(figures.fromSec),
    to: formatInstantUtc(figures.toSec),
    validity,
    seconds,
    coverage,
    minimumCoverage,
    meetsMinimum,
    LAeq: laeqDb,
    LCeq: lceqDb,
    LAFmax: levelOrNull(sums.lafmaxCentiDb),
    LAFmin: levelOrNull(sums.lafminCentiDb),
    LCpeak: levelOrNull(sums.lcpeakCentiDb),
    LAE: levels.laeDb(),
    LAN: Object.fromEntries(EXCEEDANCE_PERCENTS.map((n) => [String(n), levels.exceedanceLevelDb(n)])),
    bands: shownBands(station, levels).map((band) => bandStatistics(levels, band)),
    octaves,
    sampleSeconds: sums.sampleSec,
    isSampleMixed: sums.isSampleMixed,
    tonality: tonalityOf(station, levels),
    lowFrequency: lowFrequencyOf(levels),
    noiseRating: noiseRatingOf(octaves),
    note: figures.keptNote,
  };
}

/** Centi-decibels as dB, null kept. */
export function levelOrNull(centiDb: number | null): number | null {
  return centiDb === null ? null : centiDbToDb(centiDb);
}

function fractionOf(station: BandedStation, levels: PeriodAccumulator): BandFraction {
  return levels.sums.bandFraction ?? station.bandFraction;
}

/** The station's bands, and any other that has a level. */
function shownBands(station: BandedStation, levels: PeriodAccumulator): Band[] {
  return bandsOf(fractionOf(station, levels)).filter(
    ({ index }) =>
      (station.firstBandIndex <= index && index <= station.lastBandIndex) ||
      (levels.sums.bandValidSec[bandSlot(index)] ?? 0) > 0,
  );
}

function octavesOf(station: BandedStation, levels: PeriodAccumulator): Band[] {
  const bands = shownBands(station, levels);
  if (fractionOf(station, levels) === 1) return bands;
  return [...new Set(bands.map(({ index }) => octaveIndexOf(index)))].map((index) => bandAt(1, index));
}

function bandStatistics(levels: PeriodAccumulator, { index, nominalHz }: Band): BandStatistics {
  return {
    nominalHz,
    Leq: levels.bandLeqDb(index),
    L10: levels.bandExceedanceLevelDb(index, 10),
    L50: levels.bandExceedanceLevelDb(index, 50),
    L90: levels.bandExceedanceLevelDb(index, 90),
  };
}

function octaveStatistics(levels: PeriodAccumulator, { index, nominalHz }: Band): BandStatistics {
  return {
    nominalHz,
    Leq: levels.octaveLeqDb(index),
    L10: levels.octaveExceedanceLevelDb(index, 10),
    L50: levels.octaveExceedanceLevelDb(index, 50),
    L90: levels.octaveExceedanceLevelDb(index, 90),
  };
}

function tonalityOf(station: BandedStation, levels: PeriodAccumulator): Statistics['tonality'] {
  if (levels.sums.validSec === 0) return { state: 'no-data', tones: [] };
  const bands = shownBands(station, levels);
  const levelsDb = bands.map(({ index }) => levels.bandLeqDb(index));
  const assessment = assessTonality(fractionOf(station, levels), levelsDb, bands, levels.sums.validSec);
  if (assessment.kind === 'not-assessable') return { state: assessment.reason, tones: [] };
  const tones = assessment.findings.flatMap(({ method, lowerIndex, upperIndex, excessTenths }) =>
    method === 'averaged-neighbours'
      ? []
      : [
          {
            lowerHz: bandAt(3, lowerIndex).lowerHz,
            upperHz: bandAt(3, upperIndex).upperHz,
            excess: excessTenths / 10,
            method,
          },
        ],
  );
  return { state: 'assessed', tones };
}

/** LCeq − LAeq; null unless both are of the same valid seconds. */
function lowFrequencyOf(levels: PeriodAccumulator): Statistics['lowFrequency'] {
  if (levels.sums.cValidSec !== levels.sums.validSec) return null;
  const indicator = lowFrequencyIndicator(levels.lceqDb(), levels.laeqDb());
  return (
    indicator && { difference: indicator.differenceDb, bound: indicator.boundDb, isAbove: indicator.isAbove }
  );
}

function noiseRatingOf(octaves: readonly BandStatistics[]): Statistics['noiseRating'] {
  const bands = octaves.map(({ nominalHz }) => bandsOf(1).find((band) => band.nominalHz === nominalHz));
  const known = bands.filter((band) => band !== undefined);
  const rating = noiseRating(
    octaves.map(({ Leq }) => Leq),
    known,
  );
  return (
    rating && {
      NR: rating.nr,
      governingHz: bandAt(1, rating.governingIndex).nominalHz,
      isAtLeast: rating.isAtLeast,
    }
  );
}
