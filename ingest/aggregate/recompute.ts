import { setImmediate as nextTurn } from 'node:timers/promises';
import { type Connection } from '#db/queries/connection';
import { deletePeriodsTouching, insertDayPeriods, type DayPeriod } from '#db/queries/dayPeriods';
import { selectMeasuredIntervals } from '#db/queries/measuredIntervals';
import { type NetworkSettings } from '#db/queries/networks';
import { deleteQuartersAt, insertQuarterHours } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { judgementOf } from '#lib/services/levels/intervalSums';
import { mergedSpans, wholeOf, type Span } from '#lib/services/levels/spans';
import { QUARTER_SEC } from '#lib/time/quarters';
import { type Chunk } from './chunks';
import { partsOf } from './parts';
import { PartRows } from './rows';

/**
 * Recomputes a chunk's quarter-hours and ended periods wholly from intervals and replaces their rows. Call it with the station
 * locked, in a transaction whose reads see everything that was committed before the chunk's marks were read. A period that still
 * runs gets no row, because it would be computed again, from all its intervals, at every post: `completePeriods` sees to it later.
 */
export async function recompute(
  chunk: Chunk,
  station: Pick<StationRow, 'id' | 'intervalSec'>,
  timeline: NetworkSettings[],
  conn: Connection,
): Promise<void> {
  const parts = partsOf(chunk, station.intervalSec, Date.now() / 1000);
  const read = (part: number) => {
    const span = parts[part]?.span;
    return heard(span && selectMeasuredIntervals(station.id, span.fromSec, span.toSec, conn));
  };
  // The database reads the parts after this one and writes those before it while this process computes, so that neither waits.
  const judging = judgementOf(
    { station, timeline, validity: 'rules' },
    wholeOf(parts.map(({ span }) => span)),
    conn,
  );
  const reading = [read(0), read(1)];
  const clearing = heard(
    Promise.all([
      deleteQuartersAt(station.id, chunk.quarterStartsSec, conn),
      deletePeriodsTouching(station.id, replacedSpans(chunk, parts), conn),
    ]),
  );
  const judgement = await judging;
  const writing: Promise<void>[] = [];
  for (const [at, part] of parts.entries()) {
    const intervals = (await reading[at]) ?? [];
    const rows = new PartRows(part, intervals, judgement);
    const quarters = rows.quarters();
    await clearing;
    writing.push(heard(insertQuarterHours(station.id, quarters, conn)));
    const periods: DayPeriod[] = [];
    for (const period of part.periods) {
      await nextTurn();
      const found = rows.period(period);
      if (found) periods.push(found);
    }
    writing.push(heard(insertDayPeriods(station.id, periods, conn)));
    reading.push(read(at + 2));
    await nextTurn();
  }
  await Promise.all([clearing, ...writing]);
}

/** Work under way whose failure is told when it is awaited; until then, unheard, it would end the process. */
function heard<T extends Promise<unknown> | undefined>(work: T): T {
  work?.catch(() => undefined);
  return work;
}

function replacedSpans({ quarterStartsSec }: Chunk, parts: readonly { periods: Span[] }[]): Span[] {
  return mergedSpans([
    ...parts.flatMap(({ periods }) => periods),
    ...quarterStartsSec.map((fromSec) => ({ fromSec, toSec: fromSec + QUARTER_SEC })),
  ]);
}
