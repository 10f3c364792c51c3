import { pool, type Connection } from './connection';

/** Until when a station's figures are sealed and its single intervals gone. Epoch seconds; 0: nothing is. */
export interface Seal {
  /** What is computed of earlier time is never computed anew, and nothing of it is taken or changed. */
  sealedBeforeSec: number;
  /** Single intervals that begin before are no longer kept; two days before the seal, for what reaches over it. */
  keptFromSec: number;
}

const NO_SEAL: Seal = { sealedBeforeSec: 0, keptFromSec: 0 };

const SEAL = { sealedBeforeSec: 'sealed_before', keptFromSec: 'kept_from' };

/** Months for which a network keeps single intervals; null: for good. */
export async function keepMonthsOf(networkId: number, conn: Connection = pool()): Promise<number | null> {
  const row: { keep_months: number | null } | undefined = await conn('interval_retention')
    .where({ network_id: networkId })
    .first('keep_months');
  return row?.keep_months ?? null;
}

/** Says for how many months a network keeps single intervals. */
export async function setKeepMonths(
  networkId: number,
  keepMonths: number | null,
  userId: string,
  conn: Connection,
): Promise<void> {
  await conn('interval_retention')
    .insert({ network_id: networkId, keep_months: keepMonths, changed_by: userId, changed_at: new Date() })
    .onConflict(['network_id'])
    .merge();
}

export async function findSeal(stationId: number, conn: Connection = pool()): Promise<Seal> {
  return (await conn('sealed_stations').where({ station_id: stationId }).first(SEAL)) ?? NO_SEAL;
}

/** The latest seal of a network's stations; null where none has one. */
export async function latestSeal(networkId: number, conn: Connection = pool()): Promise<Seal | null> {
  const row = await conn('sealed_stations')
    .join('stations', 'stations.id', 'sealed_stations.station_id')
    .where({ 'stations.network_id': networkId })
    .orderBy('sealed_before', 'desc')
    .first(SEAL);
  return row ?? null;
}

/** Seals a station up to an instant, in a transaction that holds its lock; from then on it takes nothing older. */
export async function sealStation(
  stationId: number,
  { sealedBeforeSec, keptFromSec }: Seal,
  now: Date,
  transaction: Connection,
): Promise<void> {
  await transaction('sealed_stations')
    .insert({
      station_id: stationId,
      sealed_before: sealedBeforeSec,
      kept_from: keptFromSec,
      sealed_at: now,
    })
    .onConflict(['station_id'])
    .merge();
  await transaction('stations')
    .where({ id: stationId })
    .update({ accepts_from: transaction.raw('GREATEST(COALESCE(accepts_from, 0), ?)', [sealedBeforeSec]) });
}

/** Whether anything of a station before an instant waits: to be recomputed, judged, stored, undone or moved. */
export async function hasWorkBefore(
  stationId: number,
  beforeSec: number,
  conn: Connection,
): Promise<boolean> {
  const [[row]] = (await conn.raw(
    `SELECT EXISTS (SELECT 1 FROM dirty_marks WHERE station_id = ? AND quarter_starts_at < ?)
       OR EXISTS (SELECT 1 FROM pending_windows WHERE station_id = ? AND starts_at < ?)
       OR EXISTS (SELECT 1 FROM imports WHERE station_id = ? AND state IN ('storing', 'undoing', 'redoing'))
       OR EXISTS (SELECT 1 FROM clock_shifts WHERE station_id = ? AND state IN ('moving', 'reversing')) AS waits`,
    [stationId, beforeSec, stationId, beforeSec, stationId, stationId],
  )) as [{ waits: number }[]];
  return row?.waits === 1;
}

/** Stations sealed before an instant that may still hold intervals which are no longer kept. */
export async function listSealedBefore(
  sealedAt: Date,
  conn: Connection = pool(),
): Promise<{ stationId: number; keptFromSec: number }[]> {
  return conn('sealed_stations')
    .where('sealed_at', '<=', sealedAt)
    .select({ stationId: 'station_id', keptFromSec: 'kept_from' });
}

/** Deletes at most `limit` of a station's intervals that begin before an instant, oldest first. @returns how many. */
export async function deleteIntervalsBefore(
  stationId: number,
  beforeSec: number,
  limit: number,
  conn: Connection = pool(),
): Promise<number> {
  return conn('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '<', beforeSec)
    .orderBy('starts_at')
    .limit(limit)
    .delete();
}

/** Start of a station's oldest interval; null where it has none. */
export async function oldestIntervalSec(
  stationId: number,
  conn: Connection = pool(),
): Promise<number | null> {
  const row: { starts_at: number } | undefined = await conn('interval_levels')
    .where({ station_id: stationId })
    .orderBy('starts_at')
    .first('starts_at');
  return row?.starts_at ?? null;
}

const NONE = 4_294_967_295;

/** Start of the oldest interval that an import has stored, or set aside when it was undone; null where it has none. */
export async function firstStartOfImport(
  stationId: number,
  importId: number,
  conn: Connection,
): Promise<number | null> {
  const [[row]] = (await conn.raw(
    `SELECT LEAST(
       COALESCE((SELECT MIN(starts_at) FROM interval_levels WHERE station_id = ? AND import_id = ?), ${NONE}),
       COALESCE((SELECT MIN(starts_at) FROM import_intervals WHERE import_id = ?), ${NONE})) AS first`,
    [stationId, importId, importId],
  )) as [{ first: number }[]];
  const first = Number(row?.first);
  return first === NONE ? null : first;
}
