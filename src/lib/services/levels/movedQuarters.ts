import { type ClockEpisode } from '#db/queries/clockShifts';
import { type Connection } from '#db/queries/connection';
import { LONGEST_INTERVAL_SEC, selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { type QuarterHour } from '#db/queries/quarterHours';
import { selectShiftedIn } from '#db/queries/shiftedStarts';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { currentQuarters } from './currentQuarters';
import { judgementOf, type LevelSource } from './intervalSums';
import { quarterOf } from './quarterOf';
import { mergedSpans, overlapsAny, type Span } from './spans';

/**
 * Quarter-hours of `fromSec <= t < toSec` (whole quarter-hours), ascending and without bands, as they would be if an episode of a
 * wrong clock were moved: those that it leaves or comes to are summed from intervals.
 */
export async function movedQuarters(
  source: LevelSource,
  period: Span,
  episode: ClockEpisode,
  conn: Connection,
): Promise<QuarterHour[]> {
  const touched = mergedSpans([wholeQuarters(episode, 0), wholeQuarters(episode, episode.shiftSec)]);
  const quarters = (await currentQuarters(source, period, { bands: false }, conn)).filter(
    ({ startSec }) => !overlapsAny(touched, startSec, startSec + QUARTER_SEC),
  );
  for (const span of touched) {
    const end = Math.min(span.toSec, period.toSec);
    // A day at a time, as a long backlog is read.
    for (let fromSec = Math.max(span.fromSec, period.fromSec); fromSec < end; fromSec += 96 * QUARTER_SEC) {
      const part = { fromSec, toSec: Math.min(fromSec + 96 * QUARTER_SEC, end) };
      quarters.push(...(await quartersOfPart(source, part, episode, conn)));
    }
  }
  return quarters.sort((a, b) => a.startSec - b.startSec);
}

async function quartersOfPart(
  source: LevelSource,
  part: Span,
  episode: ClockEpisode,
  conn: Connection,
): Promise<QuarterHour[]> {
  const judgement = await judgementOf(source, part, conn);
  const intervals = await movedIntervals(source.station.id, part, episode, conn);
  const found: QuarterHour[] = [];
  for (let startSec = part.fromSec; startSec < part.toSec; startSec += QUARTER_SEC) {
    const quarter = quarterOf(intervals, startSec, judgement);
    if (quarter) found.push(quarter);
  }
  return found;
}

/** Intervals that would overlap a part of time, ascending. */
async function movedIntervals(
  stationId: number,
  { fromSec, toSec }: Span,
  { shiftSec, ...episode }: ClockEpisode,
  conn: Connection,
): Promise<StoredInterval[]> {
  const isOfEpisode = ({ startSec, receivedAtSec }: StoredInterval, moved: ReadonlyMap<number, number>) =>
    startSec >= episode.fromSec &&
    startSec < episode.toSec &&
    receivedAtSec >= episode.receivedFromSec &&
    !moved.has(startSec);
  const read = async (bySec: number) => {
    const intervals = await selectIntervals(stationId, fromSec - bySec, toSec - bySec, conn);
    const moved = await selectShiftedIn(
      stationId,
      fromSec - bySec - LONGEST_INTERVAL_SEC,
      toSec - bySec,
      conn,
    );
    return { intervals, moved };
  };
  const [here, there] = [await read(0), await read(shiftSec)];
  const staying = here.intervals.filter((interval) => !isOfEpisode(interval, here.moved));
  const coming = there.intervals
    .filter((interval) => isOfEpisode(interval, there.moved))
    .map((interval) => ({ ...interval, startSec: interval.startSec + shiftSec }));
  return [...staying, ...coming].sort((a, b) => a.startSec - b.startSec);
}

function wholeQuarters({ fromSec, toSec }: ClockEpisode, bySec: number): Span {
  return {
    fromSec: quarterAt(fromSec + bySec),
    toSec: quarterAt(toSec + bySec + LONGEST_INTERVAL_SEC + QUARTER_SEC - 1),
  };
}
