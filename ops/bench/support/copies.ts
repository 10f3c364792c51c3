import { db } from '#db/client';
import { type StationRow } from '#db/queries/stations';
import { FIRST_SEC, MONTH_SEC } from './months';
import { makeStation } from './station';

/** Tables of what is computed from intervals. */
const AGGREGATES = ['quarter_hours', 'day_periods'] as const;

/** Adds stations that have what another's first months came to, without intervals of their own. */
export async function addCopies(of: StationRow, count: number, name: string, months = 1): Promise<void> {
  for (let at = 1; at <= count; at += 1) {
    const { id } = await makeStation(of.networkId, `${name}-${at}`, of.intervalSec);
    await copyAggregates(of.id, id, months);
  }
}

/** Gives a station what another's first months came to. */
export async function copyAggregates(fromId: number, toId: number, months = 1): Promise<void> {
  for (const table of AGGREGATES) {
    const [columns] = await db().raw(`SHOW COLUMNS FROM ${table}`);
    const names = (columns as { Field: string }[]).map(({ Field }) => Field);
    const cells = names.map((name) => (name === 'station_id' ? toId : name));
    await db().raw(
      `INSERT INTO ${table} (${names.join(', ')}) SELECT ${cells.join(', ')} FROM ${table}
       WHERE station_id = ? AND starts_at < ?`,
      [fromId, FIRST_SEC + months * MONTH_SEC],
    );
  }
}
