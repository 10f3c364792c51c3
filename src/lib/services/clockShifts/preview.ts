import { type ClockEpisode } from '#db/queries/clockShifts';
import { pool } from '#db/queries/connection';
import { listSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import {
  MOST_SHOWN_COLLISIONS,
  type ClockEpisodeAsked,
  type ClockShiftPreview,
} from '#lib/contracts/clockShifts';
import { formatInstantUtc } from '#lib/contracts/common';
import { MOST_PREVIEWED_DATES } from '#lib/contracts/exclusions';
import { addDays, type LocalDate } from '#lib/time/zone';
import { datesTouched, figuresOf } from '../exclusions/preview';
import { dayFigures } from '../levels/days';
import { done, type Outcome } from '../outcome';
import { planShift, type ShiftPlan } from './plan';

/** What somebody asked for as an episode. */
export function episodeOf({ from, to, shiftSeconds, receivedFrom }: ClockEpisodeAsked): ClockEpisode {
  return { fromSec: from, toSec: to, shiftSec: shiftSeconds, receivedFromSec: receivedFrom ?? 0 };
}

/** What a shift would move, and the figures of each touched date now and then. Nothing is stored. */
export async function previewShift(
  station: StationRow,
  asked: ClockEpisodeAsked,
  nowSec: number,
): Promise<Outcome<ClockShiftPreview>> {
  const episode = episodeOf(asked);
  const plan = await planShift(station.id, episode, nowSec, pool());
  if (plan.kind !== 'done') return plan;
  const { moving, colliding, quarterCount } = plan.value;
  const touched = await touchedDates(station, plan.value, episode);
  const shown = touched.slice(0, MOST_PREVIEWED_DATES);
  return done({
    intervals: moving.length,
    first: formatInstantUtc(moving[0]?.startSec ?? episode.fromSec),
    last: formatInstantUtc(moving.at(-1)?.startSec ?? episode.fromSec),
    quarterHours: quarterCount,
    collisions: {
      count: colliding.length,
      starts: colliding.slice(0, MOST_SHOWN_COLLISIONS).map(({ startSec }) => formatInstantUtc(startSec)),
    },
    dates: colliding.length > 0 ? [] : await figuresOfDates(station, shown, episode, nowSec),
    omittedDates: touched.length - shown.length,
  });
}

/** Local dates that lose or gain something, ascending. */
async function touchedDates(
  { networkId }: StationRow,
  { moving }: ShiftPlan,
  { shiftSec }: ClockEpisode,
): Promise<LocalDate[]> {
  const timeline = await listSettings(networkId);
  const [first, last] = [moving[0], moving.at(-1)];
  if (!first || !last) return [];
  const dates = [0, shiftSec].flatMap((bySec) =>
    datesTouched(
      { fromSec: first.startSec + bySec, toSec: last.startSec + last.durationSec + bySec },
      timeline,
    ),
  );
  return [...new Set(dates)].sort();
}

async function figuresOfDates(
  station: StationRow,
  dates: readonly LocalDate[],
  moved: ClockEpisode,
  nowSec: number,
): Promise<ClockShiftPreview['dates']> {
  const timeline = await listSettings(station.networkId);
  const found: ClockShiftPreview['dates'] = [];
  for (const { fromDate, toDate } of runsOf(dates)) {
    const query = { station, fromDate, toDate, timeline, nowSec };
    const [before, after] = [await dayFigures(query), await dayFigures({ ...query, moved })];
    before.forEach((day, at) => {
      const then = after[at];
      if (then) found.push({ date: day.date, before: figuresOf(day), after: figuresOf(then) });
    });
  }
  return found;
}

/** Runs of dates that follow one another; the end of each exclusive. */
function runsOf(dates: readonly LocalDate[]): { fromDate: LocalDate; toDate: LocalDate }[] {
  const runs: { fromDate: LocalDate; toDate: LocalDate }[] = [];
  for (const date of dates) {
    const last = runs.at(-1);
    if (last?.toDate === date) last.toDate = addDays(date, 1);
    else runs.push({ fromDate: date, toDate: addDays(date, 1) });
  }
  return runs;
}
