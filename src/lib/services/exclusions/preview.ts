import { pool } from '#db/queries/connection';
import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import {
  MOST_PREVIEWED_DATES,
  type DateFigures,
  type ExclusionPreview,
  type ExclusionPreviewAsked,
} from '#lib/contracts/exclusions';
import { type DayFigures } from '#lib/contracts/levels';
import { addDays, datesBetween, localDateAt, type LocalDate } from '#lib/time/zone';
import { datePeriods, dateSettings } from '../levels/datePeriods';
import { dayFigures } from '../levels/days';
import { type Span } from '../levels/spans';
import { done, type Outcome } from '../outcome';
import { chosenStations } from './chosenStations';
import { touchedSpan } from './touched';

/**
 * What the figures of each touched local date are, and would be if a period were left out at some stations. A night belongs to
 * the date on which it begins, so an exclusion after midnight touches the date before, too. Nothing is stored.
 */
export async function previewExclusion(
  networkId: number,
  { stations, from, to }: ExclusionPreviewAsked,
  nowSec: number,
): Promise<Outcome<ExclusionPreview>> {
  const chosen = await chosenStations(networkId, stations);
  if (chosen.kind !== 'done') return chosen;
  const timeline = await listSettings(networkId);
  const previews: ExclusionPreview['stations'] = [];
  for (const station of chosen.value) {
    previews.push(await previewAt(station, { fromSec: from, toSec: to }, timeline, nowSec));
  }
  return done({ stations: previews });
}

async function previewAt(
  station: StationRow,
  span: Span,
  timeline: NetworkSettings[],
  nowSec: number,
): Promise<ExclusionPreview['stations'][number]> {
  const touched = datesTouched(await touchedSpan(station.id, span, pool()), timeline);
  const shown = touched.slice(0, MOST_PREVIEWED_DATES);
  const [fromDate, lastDate] = [shown[0], shown.at(-1)];
  const dates: ExclusionPreview['stations'][number]['dates'] = [];
  if (fromDate !== undefined && lastDate !== undefined) {
    const query = { station, fromDate, toDate: addDays(lastDate, 1), timeline, nowSec };
    const [before, after] = [await dayFigures(query), await dayFigures({ ...query, alsoExcluded: [span] })];
    before.forEach((day, at) => {
      const then = after[at];
      if (then) dates.push({ date: day.date, before: figuresOf(day), after: figuresOf(then) });
    });
  }
  return {
    station: station.code,
    name: station.name,
    dates,
    omittedDates: touched.length - shown.length,
  };
}

/** Local dates whose civil day, or whose day, evening or night, overlaps a span, ascending and without gaps. */
export function datesTouched({ fromSec, toSec }: Span, timeline: NetworkSettings[]): LocalDate[] {
  const dateAt = (sec: number) => localDateAt(sec, pickSettings(timeline, sec).timeZone);
  const overlaps = (other: Span) => other.fromSec < toSec && fromSec < other.toSec;
  // Where a network's zone changes, a date may lie up to a day elsewhere in time.
  return datesBetween(addDays(dateAt(fromSec), -2), addDays(dateAt(toSec), 2)).filter((date) => {
    const civil = {
      fromSec: dateSettings(date, timeline).midnightSec,
      toSec: dateSettings(addDays(date, 1), timeline).midnightSec,
    };
    return [civil, ...datePeriods(date, timeline)].some(overlaps);
  });
}

/** Figures of a date as a preview shows them. */
export function figuresOf(day: DayFigures): DateFigures {
  const { LAeq24h, Lday, Levening, Lnight, Lden, coverage, meetsMinimum, periods, seconds } = day;
  const ofDate = [periods.day, periods.evening, periods.night];
  return {
    LAeq24h,
    Lday,
    Levening,
    Lnight,
    Lden,
    coverage,
    meetsMinimum,
    periodsMeetMinimum: ofDate.every((period) => period === null || period.meetsMinimum),
    validSeconds: seconds.valid,
  };
}
