import { type Connection } from '#db/queries/connection';
import { eachDayPeriod } from '#db/queries/dayPeriods';
import { type NetworkSettings } from '#db/queries/networks';
import { selectSelfChecks } from '#db/queries/selfChecks';
import { median, SLOPE_DAYS } from '#lib/acoustics/drift';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { addDays, datesBetween, localDateAt, type LocalDate } from '#lib/time/zone';
import { datePeriods, settingsOfDate } from '../levels/datePeriods';

/** Local dates whose nights are looked at, ascending: half a year, up to the last night that is over. */
export function driftDates(timeline: NetworkSettings[], nowSec: number): LocalDate[] {
  const zone = settingsOfDate(localDateAt(nowSec, 'UTC'), timeline).timeZone;
  const today = localDateAt(nowSec, zone);
  const dates = datesBetween(addDays(today, -SLOPE_DAYS - 1), addDays(today, 1));
  const isOver = (date: LocalDate) => (nightOf(date, timeline)?.toSec ?? Infinity) <= nowSec;
  return dates.filter(isOver).slice(-SLOPE_DAYS);
}

function nightOf(date: LocalDate, timeline: NetworkSettings[]) {
  return datePeriods(date, timeline).find(({ kind }) => kind === 'night');
}

/** The background of a night: LA90 of what was valid, null below the network's minimum coverage. */
export interface Night {
  la90Db: number | null;
  coverage: number | null;
}

/** Backgrounds of a station's nights, beside `dates`. */
export async function nightsOf(
  stationId: number,
  dates: readonly LocalDate[],
  timeline: NetworkSettings[],
  conn: Connection,
): Promise<Night[]> {
  const nights = new Map<LocalDate, Night>();
  const [first, last] = [dates[0], dates.at(-1)];
  const firstNight = first === undefined ? undefined : nightOf(first, timeline);
  const lastNight = last === undefined ? undefined : nightOf(last, timeline);
  if (!firstNight || !lastNight) return [];
  const period = { fromSec: firstNight.fromSec, toSec: lastNight.toSec };
  for await (const part of eachDayPeriod(stationId, period, { bandClasses: false }, conn)) {
    for (const { date, kind, fromSec, toSec, sums } of part) {
      if (kind !== 'night') continue;
      const coverage = Math.min(1, sums.validSec / (toSec - fromSec));
      const isEnough = coverage >= settingsOfDate(date, timeline).minimumCoverage - 1e-9;
      const levels = new PeriodAccumulator({ from: sums });
      nights.set(date, { coverage, la90Db: isEnough ? levels.exceedanceLevelDb(90) : null });
    }
  }
  return dates.map((date) => nights.get(date) ?? { la90Db: null, coverage: null });
}

/** Medians of a station's self-checks, level less nominal in dB, by local date, beside `dates`. */
export async function selfCheckDays(
  stationId: number,
  dates: readonly LocalDate[],
  zone: string,
  nowSec: number,
  conn: Connection,
): Promise<(number | null)[]> {
  const sinceSec = nowSec - (SLOPE_DAYS + 3) * 86_400;
  const ofDate = new Map<LocalDate, number[]>();
  for (const check of await selectSelfChecks(stationId, sinceSec, nowSec + 1, conn)) {
    const date = localDateAt(check.checkedAtSec, zone);
    ofDate.set(date, [...(ofDate.get(date) ?? []), (check.levelCentiDb - check.nominalCentiDb) / 100]);
  }
  return dates.map((date) => median(ofDate.get(date) ?? []));
}
