import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type BandHours } from '#lib/contracts/figureSheet';
import { localMinuteAt } from '#lib/time/zone';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { currentQuarters } from '../levels/currentQuarters';
import { sumIntervals } from '../levels/intervalSums';
import { type Span } from '../levels/spans';
import { civilHours } from './civilHours';
import { type SheetSource } from './source';
import { fractionOf, stationBands, stationOctaves } from './stationBands';

/** Quarter-hours that are held in memory at once: a month. */
const MOST_QUARTERS = 3000;
const HOURS = Array.from({ length: 24 }, (_, hour) => hour);

/**
 * Leq of each band in each hour of the clock on the wall, all dates of the period together: energies are added, never levels
 * averaged. Both hours of an autumn change belong to theirs. `levels`: those of the whole period, which say which bands there are.
 */
export async function bandHoursOf(source: SheetSource, levels: PeriodAccumulator): Promise<BandHours> {
  const { period, nowSec, timeZone, minimumCoverage, station } = source;
  const elapsed = { fromSec: period.fromSec, toSec: Math.min(period.toSec, nowSec) };
  const sums = await sumsByHour(source, elapsed);
  const thirds = stationBands(station, levels);
  const octaves = stationOctaves(station, levels);
  const expectedSec = HOURS.map(() => 0);
  for (const { hour, fromSec, toSec } of civilHours(elapsed, timeZone)) {
    expectedSec[hour] = (expectedSec[hour] ?? 0) + toSec - fromSec;
  }
  return {
    bandFraction: fractionOf(station, levels),
    bandsHz: thirds.map(({ nominalHz }) => nominalHz),
    octavesHz: octaves.map(({ nominalHz }) => nominalHz),
    hours: sums.map((of, hour) => {
      const expected = expectedSec[hour] ?? 0;
      const coverage = expected === 0 ? 0 : Math.min(1, of.sums.validSec / expected);
      return {
        hour,
        bandsLeq: thirds.map(({ index }) => of.bandLeqDb(index)),
        octavesLeq: octaves.map(({ index }) => of.octaveLeqDb(index)),
        coverage,
        meetsMinimum: expected > 0 && coverage >= minimumCoverage,
      };
    }),
  };
}

async function sumsByHour(source: SheetSource, { fromSec, toSec }: Span): Promise<PeriodAccumulator[]> {
  const { station, timeline, timeZone, conn } = source;
  const levelSource = { station, timeline, validity: 'rules' } as const;
  const sums = HOURS.map(() => new PeriodAccumulator());
  const hourOf = (sec: number) => sums[Math.floor(localMinuteAt(sec, timeZone) / 60)];
  const firstWhole = Math.min(quarterAt(fromSec + QUARTER_SEC - 1), toSec);
  const endOfWhole = Math.max(quarterAt(toSec), firstWhole);
  for (let atSec = firstWhole; atSec < endOfWhole; atSec += MOST_QUARTERS * QUARTER_SEC) {
    const part = { fromSec: atSec, toSec: Math.min(atSec + MOST_QUARTERS * QUARTER_SEC, endOfWhole) };
    for (const quarter of await currentQuarters(levelSource, part, { bands: true }, conn)) {
      hourOf(quarter.startSec)?.merge(quarter);
    }
  }
  // A zone's hours are whole quarter-hours: what is left at either end lies within one.
  for (const ragged of [
    { fromSec, toSec: firstWhole },
    { fromSec: endOfWhole, toSec },
  ]) {
    if (ragged.fromSec >= ragged.toSec) continue;
    hourOf(ragged.fromSec)?.merge(await sumIntervals(levelSource, ragged, { bandClasses: false }, conn));
  }
  return sums;
}
