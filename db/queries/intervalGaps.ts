import { pool, type Connection } from './connection';

/** No limit, but it keeps what stands within apart: data servers do not understand windows over rows. */
const ALL_ROWS = 2_147_483_647;

export interface Gap {
  fromSec: number;
  toSec: number;
}

/** Start of a station's last interval, or null when it has none. */
export async function findLastStart(stationId: number, conn: Connection = pool()): Promise<number | null> {
  const row = await conn('interval_levels')
    .where({ station_id: stationId })
    .max({ last: 'starts_at' })
    .first();
  return row?.last ?? null;
}

/**
 * Stretches without an interval between a station's intervals from `sinceSec` on, ascending. The stretch before the first
 * counts when the station had data before; that after the last does not.
 */
export async function findGaps(
  stationId: number,
  sinceSec: number,
  limit: number,
  conn: Connection = pool(),
): Promise<Gap[]> {
  const before: { endsAt: number } | undefined = await conn('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '<', sinceSec)
    .orderBy('starts_at', 'desc')
    .first({ endsAt: conn.raw('starts_at + duration_sec') });
  const [rows] = await conn.raw(
    `SELECT ends_at AS fromSec, next_at AS toSec FROM (
       SELECT ends_at, LEAD(starts_at) OVER (ORDER BY starts_at) AS next_at
       FROM (
         SELECT starts_at, starts_at + duration_sec AS ends_at FROM interval_levels
         WHERE station_id = ? AND starts_at >= ? LIMIT ${ALL_ROWS}
       ) AS own
     ) AS pairs WHERE next_at > ends_at ORDER BY ends_at LIMIT ?`,
    [stationId, sinceSec, limit],
  );
  const first = before && (await firstStartFrom(stationId, sinceSec, conn));
  const leadSec = Math.max(sinceSec, before?.endsAt ?? sinceSec);
  const lead = first !== undefined && first > leadSec ? [{ fromSec: leadSec, toSec: first }] : [];
  return [...lead, ...(rows as Gap[])].slice(0, limit);
}

async function firstStartFrom(
  stationId: number,
  sinceSec: number,
  conn: Connection,
): Promise<number | undefined> {
  const row = await conn('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '>=', sinceSec)
    .orderBy('starts_at')
    .first('starts_at');
  return row?.starts_at;
}
