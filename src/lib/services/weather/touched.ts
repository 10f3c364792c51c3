import { type Connection } from '#db/queries/connection';
import { type Span } from '#db/queries/exclusions';
import { selectAssignmentsTo } from '#db/queries/mastAssignments';
import { lockStation } from '#db/queries/stations';
import { type WeatherRecord } from '#lib/acoustics/mastWeather';
import { markTouched } from '../exclusions/touched';
import { mergedSpans } from '../levels/spans';

/**
 * Where new records of a mast may change what is known of the weather: their own time, and the gap to the records beside them as
 * far as the nearest one speaks. `records`: ascending, the new ones and those around them.
 */
export function spansSpokenOf(
  records: readonly WeatherRecord[],
  isNew: (record: WeatherRecord) => boolean,
  maximumAgeSec: number,
): Span[] {
  return mergedSpans(
    records.flatMap((record, at) => {
      if (!isNew(record)) return [];
      const before = records[at - 1];
      const endSec = record.startSec + record.durationSec;
      const afterSec = records[at + 1]?.startSec ?? Infinity;
      const beforeSec = before ? before.startSec + before.durationSec : -Infinity;
      return [
        {
          fromSec: Math.max(beforeSec, record.startSec - maximumAgeSec),
          toSec: Math.min(afterSec, endSec + maximumAgeSec),
        },
      ];
    }),
  );
}

/**
 * Marks for recomputation what some spans of a mast's time decide: the quarter-hours of every station that it is assigned to then,
 * one statement a span. Call it with the mast locked, in the read-committed transaction that changes its records; it locks the stations.
 */
export async function markStationsOf(
  mastId: number,
  spans: readonly Span[],
  transaction: Connection,
): Promise<void> {
  const [first, last] = [spans[0], spans.at(-1)];
  if (!first || !last) return;
  // An interval that begins in an assignment may reach up to an hour beyond it, and goes by it wholly.
  const whole = { fromSec: first.fromSec - 3600, toSec: last.toSec };
  const assignments = await selectAssignmentsTo(mastId, whole, transaction);
  for (const { stationId, fromSec, toSec } of assignments) {
    await lockStation(stationId, transaction);
    for (const span of spans) {
      const touched = {
        fromSec: Math.max(span.fromSec, fromSec),
        toSec: Math.min(span.toSec, toSec === null ? Infinity : toSec + 3600),
      };
      if (touched.fromSec < touched.toSec) await markTouched(stationId, touched, transaction);
    }
  }
}
