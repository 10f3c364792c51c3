import { selectStandingActivities } from '#db/queries/activities';
import { pool } from '#db/queries/connection';
import { listSettings, pickSettings } from '#db/queries/networks';
import { type QuarterHour } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { bandsOf } from '#lib/acoustics/bands';
import { levelSet, meanDifference, type LevelSet } from '#lib/acoustics/onOff';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type ActivityComparison } from '#lib/contracts/activities';
import { formatInstantUtc } from '#lib/contracts/common';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { currentQuarters } from '../levels/currentQuarters';
import { mergedSpans, type Span } from '../levels/spans';
import { cautionOf } from './caution';
import { sortQuarters } from './sortQuarters';

interface Levelled {
  block: number;
  levels: PeriodAccumulator;
}

/**
 * Levels and spectrum of a station's quarter-hours with and without a kind of activity (the period is widened to whole ones). Only
 * quarter-hours with enough valid data count; those without it only at the hours of the day at which it also occurs, so that
 * a night shift is not compared with the day.
 */
export async function compareActivity(
  station: StationRow,
  asked: Span,
  kind: string,
): Promise<ActivityComparison> {
  const period = { fromSec: quarterAt(asked.fromSec), toSec: quarterAt(asked.toSec + QUARTER_SEC - 1) };
  const timeline = await listSettings(station.networkId);
  const { minimumCoverage, timeZone } = pickSettings(timeline, period.fromSec);
  const source = { station, timeline, validity: 'rules' } as const;
  const [quarters, activities] = await Promise.all([
    currentQuarters(source, period, { bands: true }, pool()),
    selectStandingActivities(station.networkId, period, kind),
  ]);
  const covered = new Map(
    quarters.filter((one) => isCovered(one, minimumCoverage)).map((one) => [one.startSec, one]),
  );
  const sorted = sortQuarters(period, mergedSpans(activities), timeZone);
  const levelled = (slots: readonly { startSec: number; block: number }[]): Levelled[] =>
    slots.flatMap(({ startSec, block }) => {
      const quarter = covered.get(startSec);
      return quarter ? [{ block, levels: new PeriodAccumulator({ from: quarter.sums }) }] : [];
    });
  const [on, off] = [levelled(sorted.on), levelled(sorted.off)];
  const [onSet, offSet] = [setOf(on, laeq), setOf(off, laeq)];
  const { differenceDb, expandedDb } = meanDifference(onSet, offSet);
  return {
    kind,
    station: station.code,
    from: formatInstantUtc(period.fromSec),
    to: formatInstantUtc(period.toSec),
    minimumCoverage,
    on: setJson(onSet),
    off: setJson(offSet),
    leftOut: {
      partly: sorted.partly,
      uncovered: sorted.on.length + sorted.off.length - on.length - off.length,
      otherHours: sorted.otherHours,
    },
    difference: differenceDb,
    expandedUncertainty: expandedDb,
    caution: cautionOf(onSet, offSet, { differenceDb, expandedDb }),
    bands: bandsCompared(station, on, off),
  };
}

function isCovered({ sums }: QuarterHour, minimumCoverage: number): boolean {
  return sums.validSec > 0 && sums.validSec >= minimumCoverage * QUARTER_SEC - 1e-6;
}

const laeq = (levels: PeriodAccumulator) => levels.laeqDb();

function setOf(of: readonly Levelled[], levelOf: (levels: PeriodAccumulator) => number | null): LevelSet {
  return levelSet(
    of.flatMap(({ block, levels }) => {
      const levelDb = levelOf(levels);
      return levelDb === null ? [] : [{ block, levelDb }];
    }),
  );
}

function setJson({ count, blockCount, meanDb, spreadDb }: LevelSet): ActivityComparison['on'] {
  return { quarterHours: count, occasions: blockCount, mean: meanDb, spread: spreadDb };
}

function bandsCompared(
  station: StationRow,
  on: readonly Levelled[],
  off: readonly Levelled[],
): ActivityComparison['bands'] {
  return bandsOf(station.bandFraction)
    .filter(({ index }) => station.firstBandIndex <= index && index <= station.lastBandIndex)
    .map(({ index, nominalHz }) => {
      const inBand = (levels: PeriodAccumulator) =>
        levels.sums.bandFraction === station.bandFraction ? levels.bandLeqDb(index) : null;
      const [onSet, offSet] = [setOf(on, inBand), setOf(off, inBand)];
      const { differenceDb, expandedDb } = meanDifference(onSet, offSet);
      return {
        nominalHz,
        on: onSet.meanDb,
        off: offSet.meanDb,
        difference: differenceDb,
        expandedUncertainty: expandedDb,
      };
    });
}
