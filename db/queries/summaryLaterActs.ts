import { pool, type Connection } from './connection';

/** A span of a network, epoch seconds. */
interface Range {
  networkId: number;
  fromSec: number;
  toSec: number;
}

/** What happened to one station’s part of a month after an instant. Spans in epoch seconds. */
export interface LaterAct {
  kind: 'intervals' | 'exclusion' | 'withdrawal' | 'exceedance';
  stationId: number;
  count: number;
  fromSec: number;
  toSec: number;
  /** Of an exclusion. */
  reason: string | null;
}

/** What happened to a network’s month after an instant: intervals that came, exclusions made and withdrawn, exceedances looked at. */
export async function listLaterActs(
  { networkId, fromSec, toSec }: Range,
  after: Date,
  conn: Connection = pool(),
): Promise<LaterAct[]> {
  const stationIds: number[] = await conn('stations').where({ network_id: networkId }).pluck('id');
  const acts: LaterAct[] = [];
  for (const stationId of stationIds) {
    const row = await conn('interval_levels')
      .where({ station_id: stationId })
      .where('starts_at', '>=', fromSec)
      .where('starts_at', '<', toSec)
      .where('received_at', '>=', Math.floor(after.getTime() / 1000))
      .first({
        count: conn.raw('COUNT(*)'),
        fromSec: conn.raw('MIN(starts_at)'),
        toSec: conn.raw('MAX(starts_at + duration_sec)'),
      });
    if (Number(row.count) > 0) {
      acts.push({
        kind: 'intervals',
        stationId,
        count: Number(row.count),
        fromSec: Number(row.fromSec),
        toSec: Number(row.toSec),
        reason: null,
      });
    }
  }
  return [
    ...acts,
    ...(await exclusionActs({ networkId, fromSec, toSec }, after, conn)),
    ...(await exceedanceActs({ networkId, fromSec, toSec }, after, conn)),
  ];
}

async function exclusionActs(
  { networkId, fromSec, toSec }: Range,
  after: Date,
  conn: Connection,
): Promise<LaterAct[]> {
  const rows: {
    stationId: number;
    fromSec: number;
    toSec: number;
    reason: string;
    withdrawnAt: Date | null;
  }[] = await conn('exclusions')
    .where({ network_id: networkId })
    .where('starts_at', '<', toSec)
    .where('ends_at', '>', fromSec)
    .where((query) => query.where('created_at', '>', after).orWhere('withdrawn_at', '>', after))
    .orderBy('starts_at')
    .select({
      stationId: 'station_id',
      fromSec: 'starts_at',
      toSec: 'ends_at',
      reason: 'reason',
      withdrawnAt: 'withdrawn_at',
    });
  return rows.map(({ withdrawnAt, ...row }) => ({
    ...row,
    kind: withdrawnAt === null ? 'exclusion' : 'withdrawal',
    count: 1,
  }));
}

async function exceedanceActs(
  { networkId, fromSec, toSec }: Range,
  after: Date,
  conn: Connection,
): Promise<LaterAct[]> {
  const rows: { stationId: number; count: number | string; fromSec: number; toSec: number }[] = await conn(
    'exceedances',
  )
    .where({ network_id: networkId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .where((query) =>
      query
        .where('detected_at', '>', after)
        .orWhere('revised_at', '>', after)
        .orWhere('acknowledged_at', '>', after),
    )
    .groupBy('station_id')
    .select({
      stationId: 'station_id',
      count: conn.raw('COUNT(*)'),
      fromSec: conn.raw('MIN(starts_at)'),
      toSec: conn.raw('MAX(ends_at)'),
    });
  return rows.map((row) => ({ ...row, count: Number(row.count), kind: 'exceedance', reason: null }));
}

/** What of a whole network was changed after an instant: words such as `limits`. */
export async function listLaterChanges(
  networkId: number,
  after: Date,
  conn: Connection = pool(),
): Promise<('limits' | 'settings' | 'calibrations')[]> {
  const [limits, settings, calibrations] = await Promise.all([
    conn('limits as l')
      .join('limit_versions as v', 'v.limit_id', 'l.id')
      .where('l.network_id', networkId)
      .where((query) => query.where('v.created_at', '>', after).orWhere('l.withdrawn_at', '>', after))
      .first('l.id'),
    conn('network_settings')
      .where({ network_id: networkId })
      .where('created_at', '>', after)
      .first('effective_from'),
    conn('calibrations')
      .where({ network_id: networkId })
      .where((query) => query.where('created_at', '>', after).orWhere('withdrawn_at', '>', after))
      .first('id'),
  ]);
  return [
    ...(limits ? (['limits'] as const) : []),
    ...(settings ? (['settings'] as const) : []),
    ...(calibrations ? (['calibrations'] as const) : []),
  ];
}
