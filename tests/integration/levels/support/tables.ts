import { db } from '#db/client';

/** Every cell of what is computed for a station, except when it was; packed cells as hexadecimal digits. */
export async function computedRows(stationId: number): Promise<{ quarters: unknown[]; periods: unknown[] }> {
  return {
    quarters: await rowsOf('quarter_hours', stationId),
    periods: await rowsOf('day_periods', stationId),
  };
}

async function rowsOf(table: string, stationId: number): Promise<unknown[]> {
  const rows: Record<string, unknown>[] = await db()(table)
    .where({ station_id: stationId })
    .orderBy('starts_at');
  return rows.map((row) =>
    Object.fromEntries(
      Object.entries(row)
        .filter(([name]) => name !== 'computed_at')
        .map(([name, cell]) => [name, Buffer.isBuffer(cell) ? cell.toString('hex') : cell]),
    ),
  );
}

/** Overwrites the computed figures of what waits for recomputation with nonsense, so that nothing may still read them. */
export async function spoilDirty(stationId: number): Promise<void> {
  const nonsense =
    'valid_sec = 1, excluded_sec = 1, a_energy_sec = 1e12, c_energy_sec = 1e12, lafmax_centi_db = 15000';
  await db().raw(
    `UPDATE quarter_hours q SET ${nonsense} WHERE q.station_id = ? AND EXISTS
       (SELECT 1 FROM dirty_marks d WHERE d.station_id = q.station_id AND d.quarter_starts_at = q.starts_at)`,
    [stationId],
  );
  await db().raw(
    `UPDATE day_periods p SET ${nonsense} WHERE p.station_id = ? AND EXISTS
       (SELECT 1 FROM dirty_marks d WHERE d.station_id = p.station_id
         AND d.quarter_starts_at < p.ends_at AND d.quarter_starts_at + 900 > p.starts_at)`,
    [stationId],
  );
}
