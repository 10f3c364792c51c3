import type { BandFraction } from '#lib/acoustics/bands';
import { pool, type Connection } from './connection';

/** Which bands the packed levels of an interval are: absolute indices, ascending. */
export interface BandSet {
  id: number;
  fraction: BandFraction;
  indices: Int8Array;
}

// Rows of band_sets never change, so a process may remember them.
const byId = new Map<number, BandSet>();
const byBands = new Map<string, BandSet>();

/** The band set of an id. @throws when there is none. */
export async function bandSetById(id: number, conn: Connection = pool()): Promise<BandSet> {
  const known = byId.get(id);
  if (known) return known;
  const row = await conn('band_sets').where({ id }).first('id', 'fraction', 'band_indices');
  if (!row) throw new Error(`There is no band set ${id}.`);
  return remember(row);
}

/** The band set of these bands, added when it is new. Runs outside the caller's transaction, so that it can be remembered. */
export async function bandSetOf(fraction: BandFraction, indices: readonly number[]): Promise<BandSet> {
  const bandIndices = indices.join(',');
  const known = byBands.get(`${fraction}:${bandIndices}`);
  if (known) return known;
  const find = () =>
    pool()('band_sets')
      .where({ fraction, band_indices: bandIndices })
      .first('id', 'fraction', 'band_indices');
  const found = (await find()) ?? (await add(fraction, bandIndices).then(find));
  return remember(found);
}

/**
 * Band sets of a station's intervals that begin in `fromSec <= t < toSec`, and how many of the first `limit` intervals have
 * each.
 */
export async function countBandSets(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  limit: number,
  conn: Connection = pool(),
): Promise<{ set: BandSet; count: number }[]> {
  const first = conn('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .orderBy('starts_at')
    .limit(limit)
    .select('band_set_id')
    .as('first');
  const rows: { id: number; count: number }[] = await conn
    .from(first)
    .groupBy('band_set_id')
    .select({ id: 'band_set_id', count: conn.raw('COUNT(*)') });
  const sets: { set: BandSet; count: number }[] = [];
  for (const { id, count } of rows) sets.push({ set: await bandSetById(id, conn), count });
  return sets;
}

async function add(fraction: BandFraction, bandIndices: string): Promise<void> {
  await pool()('band_sets')
    .insert({ fraction, band_indices: bandIndices })
    .catch((error: { code?: string }) => {
      if (error.code !== 'ER_DUP_ENTRY') throw error;
    });
}

function remember(row: { id: number; fraction: BandFraction; band_indices: string }): BandSet {
  const indices = row.band_indices === '' ? [] : row.band_indices.split(',').map(Number);
  const set: BandSet = { id: row.id, fraction: row.fraction, indices: Int8Array.from(indices) };
  byId.set(row.id, set);
  byBands.set(`${row.fraction}:${row.band_indices}`, set);
  return set;
}
