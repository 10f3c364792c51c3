import { pool, type Connection } from './connection';

/** Something wrong with a station, from when until when. Epoch seconds. */
export interface TroubleRow {
  id: number;
  networkId: number;
  stationId: number;
  stationCode: string;
  stationName: string;
  kind: string;
  beginsAtSec: number;
  noticedAt: Date;
  measured: number | null;
  bound: number | null;
  /** Seems over since then. */
  fineSinceSec: number | null;
  /** Null: not over. */
  endsAtSec: number | null;
}

const COLUMNS = {
  id: 't.id',
  networkId: 't.network_id',
  stationId: 't.station_id',
  stationCode: 'stations.code',
  stationName: 'stations.name',
  kind: 't.kind',
  beginsAtSec: 't.begins_at',
  noticedAt: 't.noticed_at',
  measured: 't.measured',
  bound: 't.bound',
  fineSinceSec: 't.fine_since',
  endsAtSec: 't.ends_at',
} as const;

function selectTroubles(conn: Connection) {
  return conn({ t: 'health_troubles' }).join('stations', 'stations.id', 't.station_id').select(COLUMNS);
}

/** Troubles of a network's stations that are not over. */
export async function listOpenTroubles(networkId: number, conn: Connection = pool()): Promise<TroubleRow[]> {
  return selectTroubles(conn).where({ 't.network_id': networkId, 't.is_open': 1 });
}

export interface TroubleListQuery {
  networkId: number;
  stationId: number | null;
  /** Those that overlap this half-open period. */
  fromSec: number;
  toSec: number;
  limit: number;
  /** Beginning and id of the last one of the page before. */
  after: { beginsAtSec: number; id: number } | null;
}

/** Troubles of a network, over or not, latest beginning first. */
export async function listTroubles(
  { networkId, stationId, fromSec, toSec, limit, after }: TroubleListQuery,
  conn: Connection = pool(),
): Promise<TroubleRow[]> {
  const rows = selectTroubles(conn)
    .where('t.network_id', networkId)
    .where('t.begins_at', '<', toSec)
    .where((query) => query.whereNull('t.ends_at').orWhere('t.ends_at', '>', fromSec))
    .orderBy([
      { column: 't.begins_at', order: 'desc' },
      { column: 't.id', order: 'desc' },
    ])
    .limit(limit);
  if (stationId !== null) rows.where('t.station_id', stationId);
  if (after) rows.whereRaw('(t.begins_at, t.id) < (?, ?)', [after.beginsAtSec, after.id]);
  return rows;
}

export type NewTrouble = Pick<
  TroubleRow,
  'networkId' | 'stationId' | 'kind' | 'beginsAtSec' | 'measured' | 'bound'
>;

/** Adds a trouble and answers its id; null when the station has an open one of the kind already. */
export async function insertTrouble(trouble: NewTrouble, conn: Connection): Promise<number | null> {
  try {
    const [id] = await conn('health_troubles').insert({
      network_id: trouble.networkId,
      station_id: trouble.stationId,
      kind: trouble.kind,
      begins_at: trouble.beginsAtSec,
      noticed_at: new Date(),
      measured: trouble.measured,
      bound: trouble.bound,
    });
    return Number(id);
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    return null;
  }
}

/** Notes how an open trouble stands. */
export async function updateTrouble(
  id: number,
  state: Pick<TroubleRow, 'measured' | 'bound' | 'fineSinceSec'>,
  conn: Connection,
): Promise<void> {
  await conn('health_troubles')
    .where({ id, is_open: 1 })
    .update({ measured: state.measured, bound: state.bound, fine_since: state.fineSinceSec });
}

/** Ends an open trouble; false when it was over before. */
export async function endTrouble(id: number, endsAtSec: number, conn: Connection): Promise<boolean> {
  const changed = await conn('health_troubles')
    .where({ id, is_open: 1 })
    .update({ ends_at: endsAtSec, is_open: null });
  return changed === 1;
}
