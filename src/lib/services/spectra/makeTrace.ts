import { type Connection } from '#db/queries/connection';
import { selectMeasuredIntervals } from '#db/queries/measuredIntervals';
import { type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { bandSlot } from '#lib/acoustics/bands';
import { DAY_MINUTES, DayTraceBuilder, type DayTrace } from '#lib/acoustics/dayTrace';
import { counts, firstEndingAfter, rulesSpans } from '../levels/accumulate';
import { judgementOf } from '../levels/intervalSums';

export const DAY_SEC = DAY_MINUTES * 60;

/** The trace of a station's day of UTC from its valid intervals as they stand; null when nothing of it is valid. */
export async function makeTrace(
  station: Pick<StationRow, 'id' | 'intervalSec'>,
  timeline: NetworkSettings[],
  dayStartSec: number,
  conn: Connection,
): Promise<DayTrace | null> {
  const day = { fromSec: dayStartSec, toSec: dayStartSec + DAY_SEC };
  const judgement = await judgementOf({ station, timeline, validity: 'rules' }, day, conn);
  const intervals = await selectMeasuredIntervals(station.id, day.fromSec, day.toSec, conn);
  const builder = new DayTraceBuilder();
  const slotsOf = new Map<Int8Array, Int8Array>();
  for (const span of rulesSpans(day.fromSec, day.toSec, timeline)) {
    for (let at = firstEndingAfter(intervals, span.fromSec); at < intervals.length; at += 1) {
      const interval = intervals[at];
      if (!interval || interval.startSec >= span.toSec) break;
      if (!counts(interval, span.rules, judgement)) continue;
      const { laeqCentiDb, bandFraction, bandIndices, levelsCentiDb } = interval;
      const slots = slotsOf.get(bandIndices) ?? bandIndices.map(bandSlot);
      slotsOf.set(bandIndices, slots);
      const endSec = interval.startSec + interval.durationSec;
      builder.add(
        { laeqCentiDb, bandFraction, slots, levelsCentiDb },
        Math.max(interval.startSec, span.fromSec) - dayStartSec,
        Math.min(endSec, span.toSec) - dayStartSec,
      );
    }
  }
  return builder.trace();
}
