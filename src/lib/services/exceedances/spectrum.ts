import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { bandByNominalHz, type Band, type BandFraction } from '#lib/acoustics/bands';
import { standingOut, type StandingOutRange } from '#lib/acoustics/standingOut';
import type { ExceedanceDetailPart } from '#lib/contracts/exceedanceDetail';
import type { Statistics } from '#lib/contracts/levels';
import type { Span } from '../levels/spans';
import { rangeWords } from './rangeWords';
import { usualSpectrum } from './usualSpectrum';

export type ComparedSpectrum = Pick<
  ExceedanceDetailPart,
  'usual' | 'bands' | 'standingOut' | 'tonality' | 'bandFraction'
>;

/** With fewer weeks a level is not called above the usual one. */
const LEAST_WEEKS = 3;

/** The mean spectrum of a window beside what is usual for it, and what stands out of it. */
export async function comparedSpectrum(
  station: StationRow,
  window: Span,
  { statistics, fraction }: { statistics: Statistics; fraction: BandFraction },
  timeline: NetworkSettings[],
): Promise<ComparedSpectrum> {
  const measured = statistics.bands.flatMap(({ nominalHz, Leq }) => {
    const band = bandByNominalHz(fraction, nominalHz);
    return band ? [{ band, Leq }] : [];
  });
  const bands = measured.map(({ band }) => band);
  const usual = await usualSpectrum(station, window, bands, timeline);
  const { ranges } = standingOut({
    fraction,
    bands,
    levelsDb: measured.map(({ Leq }) => Leq),
    averagedSec: statistics.seconds.valid,
    ...(usual.validWeeks >= LEAST_WEEKS && { usualDb: usual.bands.map(({ medianDb }) => medianDb) }),
  });
  return {
    bandFraction: fraction,
    usual: {
      weeks: usual.weeks,
      validWeeks: usual.validWeeks,
      median: usual.laeq.medianDb,
      low: usual.laeq.lowDb,
      high: usual.laeq.highDb,
    },
    bands: measured.map(({ band, Leq }, at) => ({
      nominalHz: band.nominalHz,
      Leq,
      usual: usual.bands[at]?.medianDb ?? null,
      usualLow: usual.bands[at]?.lowDb ?? null,
      usualHigh: usual.bands[at]?.highDb ?? null,
      isStandingOut: ranges.some((range) => standsAmongNeighbours(range) && holds(range, band)),
    })),
    standingOut: ranges.map((range) => rangeView(range, fraction)),
    tonality: statistics.tonality.state,
  };
}

/** A loud window may be above usual in every band: that is told, but marks none of them. */
function standsAmongNeighbours({ reasons }: StandingOutRange): boolean {
  return reasons.some((reason) => reason !== 'above-usual');
}

function holds({ lowerIndex, upperIndex }: StandingOutRange, { index }: Band): boolean {
  return lowerIndex <= index && index <= upperIndex;
}

function rangeView(range: StandingOutRange, fraction: BandFraction) {
  return {
    fromHz: range.fromHz,
    toHz: range.toHz,
    reasons: range.reasons,
    words: rangeWords(range, fraction),
    level: range.levelDb,
    excessOverNeighbours: range.excessOverNeighboursDb,
    excessOverUsual: range.excessOverUsualDb,
    aShare: range.aShare,
  };
}
