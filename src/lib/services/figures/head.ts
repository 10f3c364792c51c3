import { bandAt, bandLabel } from '#lib/acoustics/bands';
import { type Fact, type IntervalFacts } from '#lib/contracts/figureSheet';
import { type Incident } from '#lib/contracts/levels';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage } from '#lib/format/levels';
import { formatPeriod, formatZone } from '#lib/format/times';
import { placementWords } from './facadeRows';
import { type PeriodFigures } from '../levels/figures';
import { type PeriodInstruments } from './instruments';
import { type SheetSource } from './source';

export interface HeadFacts {
  intervals: IntervalFacts | null;
  instruments: PeriodInstruments;
  incident: Incident;
  /** Wind of the period by its sources, in words; null where it was not read. */
  wind: string | null;
}

/** What the figures are of, fact by fact. */
export function headOf(
  source: SheetSource,
  figures: PeriodFigures,
  { intervals, instruments, incident, wind }: HeadFacts,
): Fact[] {
  const { station, period, timeZone, nowSec } = source;
  const { seconds, coverage, minimumCoverage, meetsMinimum } = figures;
  const edges = [station.firstBandIndex, station.lastBandIndex].map((index) =>
    bandLabel(bandAt(station.bandFraction, index)),
  );
  const height = station.mastHeightM === null ? '' : `, ${station.mastHeightM} m above ground`;
  const toCome = period.toSec > nowSec ? ` of which ${formatDuration(seconds.expected)} have elapsed` : '';
  return [
    { name: 'Station', words: `${station.name} (${station.code})` },
    { name: 'Place', words: `${placementWords(incident, timeZone)}${height}` },
    {
      name: 'Measures',
      words: `${station.bandFraction === 3 ? 'one-third octaves' : 'octaves'} ${edges.join('–')}, intervals of ${formatDuration(station.intervalSec)}`,
    },
    {
      name: 'Instrument',
      words: instruments.words,
    },
    {
      name: 'Period',
      words: `${formatPeriod(period, timeZone)}: ${formatDuration(period.toSec - period.fromSec)}${toCome}`,
    },
    { name: 'Time zone', words: formatZone(timeZone, period) },
    {
      name: 'Coverage',
      words: `${formatCoverage(coverage)}: ${formatDuration(seconds.valid)} valid of ${formatDuration(seconds.expected)}, ${meetsMinimum ? 'enough' : 'not enough'} for the minimum of ${formatCoverage(minimumCoverage)}`,
    },
    { name: 'Intervals', words: intervalWords(figures, intervals) },
    { name: 'Left out', words: leftOutWords(figures, intervals) },
    ...(wind === null ? [] : [{ name: 'Wind', words: wind }]),
  ];
}

function intervalWords({ levels }: PeriodFigures, intervals: IntervalFacts | null): string {
  const { sampleSec, isSampleMixed, validSec } = levels.sums;
  const length = isSampleMixed ? 'of different lengths' : sampleSec === null ? '' : `of ${sampleSec} s`;
  if (intervals) return `${intervals.counted} valid ${length}, ${intervals.leftOut} left out`;
  return sampleSec === null
    ? `valid ones ${length}`
    : `about ${Math.round(validSec / sampleSec)} valid ${length}`;
}

function leftOutWords({ seconds }: PeriodFigures, intervals: IntervalFacts | null): string {
  const total = formatDuration(seconds.excluded);
  if (seconds.excluded === 0) return 'nothing of what was measured';
  if (!intervals) return `${total} of what was measured`;
  const reasons = intervals.reasons.map(({ reason, sec }) => `${reason} ${formatDuration(sec)}`).join(', ');
  const several = intervals.reasons.length > 1 ? ' (an interval may have several reasons)' : '';
  return `${total} of what was measured: ${reasons}${several}`;
}
