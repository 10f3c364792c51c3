import { ldenDb, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { COMPARED, type ExclusionEffect } from '#lib/contracts/monthEvidence';
import { type DocumentFigures } from '#lib/contracts/monthFigures';
import { datesBetween } from '#lib/time/zone';
import { datePeriods, settingsOfDate } from '../../levels/datePeriods';
import { type QuarterSeries } from '../../levels/quarterSeries';
import { levelOrNull } from '../../levels/statistics';
import { exclusionPage } from '../../exclusions/list';
import { type MonthEvidence } from './evidence';
import { rawMonth, reasonsInOrder } from './rawSeries';

type Compared = (typeof COMPARED)[number];
type Levels = Record<Compared, number | null>;

const MOST_EXCLUSIONS = 500;

/** What rules and exclusions leave out of a month, and what its figures would be with it. */
export async function exclusionEffect(
  evidence: MonthEvidence,
  figures: DocumentFigures,
  isSchemeMixed: boolean,
): Promise<ExclusionEffect> {
  const { station, span } = evidence;
  const { items } = await exclusionPage({
    networkId: station.networkId,
    stationId: station.id,
    fromSec: span.fromSec,
    toSec: Math.max(span.toSec, span.lastNightEndSec),
    limit: MOST_EXCLUSIONS,
    cursor: null,
  });
  const { series, leftOutSec } = await rawMonth(evidence);
  const all = await levelsOf(evidence, series, isSchemeMixed);
  return {
    items: items
      .filter(({ withdrawal }) => withdrawal === null)
      .map(({ from, to, reason }) => ({ from, to, reason }))
      .reverse(),
    leftOut: reasonsInOrder(leftOutSec).map(([reason, seconds]) => ({ reason, seconds })),
    figures: COMPARED.map((quantity) => {
      const valid = figures[quantity];
      const difference = valid === null || all[quantity] === null ? null : valid - all[quantity];
      return { quantity, valid, all: all[quantity], difference };
    }),
  };
}

async function levelsOf(
  { span, timeline }: MonthEvidence,
  series: QuarterSeries,
  isSchemeMixed: boolean,
): Promise<Levels> {
  const month = await series.levels({ fromSec: span.fromSec, toSec: span.toSec });
  const pooled = new Map<PeriodKind, PeriodAccumulator>();
  for (const date of datesBetween(span.firstDate, span.endDate)) {
    for (const { kind, ...period } of datePeriods(date, timeline)) {
      const levels = pooled.get(kind) ?? new PeriodAccumulator();
      pooled.set(kind, levels);
      levels.merge(await series.levels(period));
    }
  }
  const levelOf = (kind: PeriodKind) => pooled.get(kind)?.laeqDb() ?? null;
  const levelsDb = { day: levelOf('day'), evening: levelOf('evening'), night: levelOf('night') };
  return {
    Lday: levelsDb.day,
    Levening: levelsDb.evening,
    Lnight: levelsDb.night,
    Lden: isSchemeMixed ? null : ldenDb(settingsOfDate(span.firstDate, timeline).scheme, levelsDb),
    LAeq: month.laeqDb(),
    LA10: month.exceedanceLevelDb(10),
    LA50: month.exceedanceLevelDb(50),
    LA90: month.exceedanceLevelDb(90),
    LAFmax: levelOrNull(month.sums.lafmaxCentiDb),
  };
}
