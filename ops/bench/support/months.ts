import { db } from '#db/client';
import { inTransaction, pool } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { markMeasuredQuarters } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { fill } from './station';

/** A month of 30 days, in seconds. */
export const MONTH_SEC = 30 * 86_400;
/** The first midnight of what is filled. */
export const FIRST_SEC = Date.parse('2025-01-01T00:00:00Z') / 1000;

/** Fills a station with a month of minutes and computes what follows from them. */
export async function fillMonth(station: StationRow): Promise<void> {
  await fill(station.id, FIRST_SEC, MONTH_SEC / 60, 60);
  await inTransaction((transaction) => markMeasuredQuarters(station.id, transaction));
  await aggregateAll(async () => undefined);
}

/**
 * Repeats the first month to make `months`, rows and what was computed from them alike: by UTC a shift changes neither. The nights
 * between two months are computed anew.
 */
export async function repeatMonth(station: StationRow, months = 12): Promise<void> {
  for (let month = 1; month < months; month += 1) {
    const shiftSec = month * MONTH_SEC;
    await repeat('interval_levels', station.id, { starts_at: `starts_at + ${shiftSec}` });
    await repeat('quarter_hours', station.id, { starts_at: `starts_at + ${shiftSec}` });
    await repeat('day_periods', station.id, {
      local_date: `local_date + INTERVAL ${month * 30} DAY`,
      starts_at: `starts_at + ${shiftSec}`,
      ends_at: `ends_at + ${shiftSec}`,
    });
  }
  const midnights = Array.from({ length: months }, (_, month) => FIRST_SEC + month * MONTH_SEC);
  await insertDirtyMarks(station.id, midnights, pool());
  await aggregateAll(async () => undefined);
}

/** Copies a station's rows of the first month with changed cells; day periods only where they lie whole within it. */
async function repeat(table: string, stationId: number, changed: Record<string, string>): Promise<void> {
  const [columns] = await db().raw(`SHOW COLUMNS FROM ${table}`);
  const names = (columns as { Field: string }[]).map(({ Field }) => Field);
  const cells = names.map((name) => changed[name] ?? name);
  const endSec = FIRST_SEC + MONTH_SEC;
  const isWhole = table === 'day_periods' ? `AND ends_at <= ${endSec} AND starts_at >= ${FIRST_SEC}` : '';
  await db().raw(
    `INSERT INTO ${table} (${names.join(', ')}) SELECT ${cells.join(', ')} FROM ${table}
     WHERE station_id = ? AND starts_at < ? ${isWhole}`,
    [stationId, endSec],
  );
}
