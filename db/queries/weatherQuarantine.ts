import { createHash } from 'node:crypto';
import { pool, type Connection } from './connection';

/** A mast's record that was refused, with its reason. */
export interface RefusedWeather {
  code: string;
  detail: string;
  /** JSON as received. */
  record: string;
  startSec: number | null;
}

export type WeatherSettlement = 'released' | 'dismissed' | 'superseded';

/** One that is kept; open while nobody has settled it. */
export interface RefusedWeatherRow extends RefusedWeather {
  id: number;
  receivedAt: Date;
  timesReceived: number;
  settlement: WeatherSettlement | null;
  settledAt: Date | null;
  settledByName: string | null;
  settlementReason: string | null;
}

const digestOf = (record: string) => createHash('sha256').update(record).digest();

/** Keeps refused records of a mast. The same refused again for the same reason is counted, not kept twice. */
export async function insertRefusedWeather(
  mastId: number,
  records: readonly RefusedWeather[],
  receivedAt: Date,
  transaction: Connection,
): Promise<void> {
  for (let first = 0; first < records.length; first += 100) {
    const part = records.slice(first, first + 100);
    await transaction.raw(
      `INSERT INTO weather_quarantine (mast_id, code, detail, record, record_digest, starts_at, received_at)
       VALUES ${part.map(() => '(?, ?, ?, ?, ?, ?, ?)').join(', ')}
       ON DUPLICATE KEY UPDATE times_received = times_received + 1`,
      part.flatMap(({ code, detail, record, startSec }) => [
        mastId,
        code,
        detail.slice(0, 500),
        record,
        digestOf(record),
        // A driver's binding of null is NULL; its type does not say so.
        startSec as number,
        receivedAt,
      ]),
    );
  }
}

/** Keeps a stored record that a released one replaces. It may have been replaced and put back before. */
export async function insertSupersededWeather(
  mastId: number,
  record: Omit<RefusedWeather, 'code'>,
  by: { userId: string; reason: string; receivedAt: Date },
  transaction: Connection,
): Promise<void> {
  const settled = {
    detail: record.detail,
    settlement: 'superseded',
    settlement_reason: by.reason,
    settled_at: new Date(),
    settled_by: by.userId,
  };
  await transaction('weather_quarantine')
    .insert({
      ...settled,
      mast_id: mastId,
      code: 'superseded',
      record: record.record,
      record_digest: digestOf(record.record),
      starts_at: record.startSec,
      received_at: by.receivedAt,
    })
    .onConflict()
    .merge(settled);
}

/** Records of a mast in one of the states, the latest kept first, at most `limit`. */
export async function listRefusedWeather(
  mastId: number,
  state: WeatherSettlement | 'open' | null,
  limit: number,
  conn: Connection = pool(),
): Promise<RefusedWeatherRow[]> {
  const rows = conn('weather_quarantine')
    .leftJoin('users', 'users.id', 'weather_quarantine.settled_by')
    .where({ mast_id: mastId })
    .orderBy('weather_quarantine.id', 'desc')
    .limit(limit)
    .select({
      id: 'weather_quarantine.id',
      code: 'code',
      detail: 'detail',
      record: 'record',
      startSec: 'starts_at',
      receivedAt: 'received_at',
      timesReceived: 'times_received',
      settlement: 'settlement',
      settledAt: 'settled_at',
      settledByName: 'users.name',
      settlementReason: 'settlement_reason',
    });
  if (state === 'open') rows.whereNull('settlement');
  else if (state !== null) rows.where({ settlement: state });
  return rows;
}

/** How many of each of a network's masts are open, of those that have any, by code. */
export async function countRefusedWeather(
  networkId: number,
  conn: Connection = pool(),
): Promise<{ mastCode: string; count: number }[]> {
  const rows: { mastCode: string; count: number | string }[] = await conn('weather_quarantine')
    .join('masts', 'masts.id', 'weather_quarantine.mast_id')
    .where('masts.network_id', networkId)
    .whereNull('settlement')
    .groupBy('masts.code')
    .orderBy('masts.code')
    .select({ mastCode: 'masts.code' })
    .count({ count: '*' });
  return rows.map(({ mastCode, count }) => ({ mastCode, count: Number(count) }));
}

/** Some of a mast's records that have one of some states (or the oldest of them all: null), locked until the transaction ends. */
export async function lockRefusedWeather(
  mastId: number,
  ids: readonly number[] | null,
  states: readonly (WeatherSettlement | 'open')[],
  limit: number,
  transaction: Connection,
): Promise<{ id: number; record: string; receivedAt: Date }[]> {
  const rows = transaction('weather_quarantine')
    .where({ mast_id: mastId })
    .where((state) => {
      void state.whereIn('settlement', [...states]);
      if (states.includes('open')) void state.orWhereNull('settlement');
    })
    .orderBy('id')
    .limit(limit)
    .forUpdate()
    .select({ id: 'id', record: 'record', receivedAt: 'received_at' });
  if (ids) rows.whereIn('id', [...ids]);
  return rows;
}

/** Settles records, or opens them again (`null`). */
export async function settleRefusedWeather(
  ids: readonly number[],
  settlement: { as: WeatherSettlement; by: string; reason: string | null } | null,
  transaction: Connection,
): Promise<void> {
  await transaction('weather_quarantine')
    .whereIn('id', [...ids])
    .update({
      settlement: settlement?.as ?? null,
      settlement_reason: settlement?.reason ?? null,
      settled_at: settlement ? new Date() : null,
      settled_by: settlement?.by ?? null,
    });
}
