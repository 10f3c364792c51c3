import { bandAt, BAND_SLOTS } from '#lib/acoustics/bands';
import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { lowFrequencyIndicator, LOW_FREQUENCY_BOUND_DB } from '#lib/acoustics/lowFrequency';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type PeriodSums } from '#lib/acoustics/periodSums';
import { toTenths } from '#lib/acoustics/rounding';
import { assessTonality, surveyTones } from '#lib/acoustics/tonality';
import { type DocumentLowFrequency, type DocumentTonality } from '#lib/contracts/monthEvidence';
import { QUARTER_SEC } from '#lib/time/quarters';
import { fractionOf, stationBands } from '../../figures/stationBands';
import { type MonthEvidence } from './evidence';

/** Quarter-hours with less valid time are not looked at for tones. */
const LEAST_SEC = 60;

/** Tones of the month’s mean spectrum, and how many quarter-hours have one by the survey method. */
export function documentTonality(evidence: MonthEvidence, month: PeriodAccumulator): DocumentTonality {
  const blocks = tonalBlocks(evidence);
  const mean = meanTones(evidence, month);
  return { ...mean, blockSeconds: QUARTER_SEC, ...blocks };
}

/** LCeq − LAeq of the month and of its quarter-hours against the bound. */
export function documentLowFrequency(
  { quarters, span }: MonthEvidence,
  month: PeriodAccumulator,
): DocumentLowFrequency {
  const found = lowFrequencyIndicator(month.lceqDb(), month.laeqDb());
  let [assessedBlocks, blocksAbove] = [0, 0];
  for (const { startSec, sums } of quarters) {
    // Both are to be of the same intervals.
    if (startSec >= span.toSec || sums.validSec === 0 || sums.cValidSec !== sums.validSec) continue;
    assessedBlocks += 1;
    const quarter = new PeriodAccumulator({ from: sums });
    if (lowFrequencyIndicator(quarter.lceqDb(), quarter.laeqDb())?.isAbove) blocksAbove += 1;
  }
  return {
    bound: LOW_FREQUENCY_BOUND_DB,
    difference: found?.differenceDb ?? null,
    isAbove: found?.isAbove ?? false,
    assessedBlocks,
    blocksAbove,
  };
}

function meanTones(
  { station }: MonthEvidence,
  month: PeriodAccumulator,
): Pick<DocumentTonality, 'notAssessable' | 'tones'> {
  if (month.sums.validSec === 0) {
    return { notAssessable: 'no-data', tones: [] };
  }
  const bands = stationBands(station, month);
  const levelsDb = bands.map(({ index }) => month.bandLeqDb(index));
  const found = assessTonality(fractionOf(station, month), levelsDb, bands, month.sums.validSec);
  if (found.kind === 'not-assessable') return { notAssessable: found.reason, tones: [] };
  const tones = found.findings.flatMap(({ method, lowerIndex, upperIndex, excessTenths, thresholdTenths }) =>
    method === 'averaged-neighbours'
      ? []
      : [
          {
            method,
            lowerHz: bandAt(3, lowerIndex).lowerHz,
            upperHz: bandAt(3, upperIndex).upperHz,
            excess: excessTenths / 10,
            threshold: thresholdTenths / 10,
          },
        ],
  );
  return { notAssessable: null, tones };
}

/** Mean spectrum of a quarter-hour as the method takes it: a month has thousands, so they are made without anything between. */
function spectrumTenths({ bandEnergySec, bandValidSec }: PeriodSums): (number | null)[] {
  const tenths = new Array<number | null>(BAND_SLOTS).fill(null);
  for (let slot = 0; slot < BAND_SLOTS; slot += 1) {
    const sec = bandValidSec[slot] ?? 0;
    const levelDb = sec > 0 ? levelOfEnergyDb((bandEnergySec[slot] ?? 0) / sec) : null;
    tenths[slot] = levelDb === null ? null : toTenths(levelDb);
  }
  return tenths;
}

function tonalBlocks({
  span,
  quarters,
}: MonthEvidence): Pick<DocumentTonality, 'assessedBlocks' | 'tonalBlocks' | 'bands'> {
  const blocksOfBand = new Map<number, number>();
  let [assessedBlocks, tonal] = [0, 0];
  for (const { startSec, sums } of quarters) {
    if (startSec >= span.toSec || sums.bandFraction !== 3 || sums.validSec < LEAST_SEC) continue;
    assessedBlocks += 1;
    const tones = surveyTones(spectrumTenths(sums));
    if (tones.length > 0) tonal += 1;
    for (const { lowerIndex } of tones) {
      blocksOfBand.set(lowerIndex, (blocksOfBand.get(lowerIndex) ?? 0) + 1);
    }
  }
  const bands = [...blocksOfBand]
    .sort(([a, many], [b, more]) => more - many || a - b)
    .map(([index, blocks]) => ({ nominalHz: bandAt(3, index).nominalHz, blocks }));
  return { assessedBlocks, tonalBlocks: tonal, bands };
}
