import { insertRows, pool, type Connection, type Writes } from './connection';

/** The newest interval of a station, and when the station last posted anything new. */
export interface LatestInterval {
  stationId: number;
  startSec: number;
  durationSec: number;
  laeqCentiDb: number;
  lafmaxCentiDb: number | null;
  flags: number;
  windSpeedMs: number | null;
  batteryV: number | null;
  receivedAt: Date;
}

/**
 * Notes what a post brought; an interval older than the one noted moves only the time of the last post. What is no post
 * (`isPost: false`, a file that somebody brought) leaves that time as it is.
 */
export async function noteLatest(latest: LatestInterval, conn: Writes, isPost = true): Promise<void> {
  const newer = (column: string) =>
    `${column} = IF(VALUES(starts_at) > starts_at, VALUES(${column}), ${column})`;
  // starts_at comes last: the other assignments compare with its old value.
  const columns = [
    'duration_sec',
    'laeq_centi_db',
    'lafmax_centi_db',
    'flags',
    'wind_speed_centi_ms',
    'battery_centi_v',
  ];
  await insertRows(conn, {
    head: `INSERT INTO station_latest (station_id, starts_at, ${columns.join(', ')}, received_at)`,
    rows: ['(?, ?, ?, ?, ?, ?, ?, ?, ?)'],
    tail: `ON DUPLICATE KEY UPDATE ${columns.map(newer).join(', ')},
       received_at = ${isPost ? 'GREATEST(received_at, VALUES(received_at))' : 'received_at'},
       starts_at = GREATEST(starts_at, VALUES(starts_at))`,
    bindings: [
      latest.stationId,
      latest.startSec,
      latest.durationSec,
      latest.laeqCentiDb,
      latest.lafmaxCentiDb,
      latest.flags,
      latest.windSpeedMs === null ? null : Math.round(latest.windSpeedMs * 100),
      latest.batteryV === null ? null : Math.round(latest.batteryV * 100),
      latest.receivedAt,
    ],
  });
}

/** Notes the newest stored interval anew, after stored ones went; the time of the last post stays. Without any, the row goes. */
export async function rederiveLatest(stationId: number, conn: Connection): Promise<void> {
  const [changed] = await conn.raw(
    `UPDATE station_latest AS latest JOIN (
       SELECT * FROM interval_levels WHERE station_id = ? ORDER BY starts_at DESC LIMIT 1
     ) AS newest ON newest.station_id = latest.station_id
     SET latest.starts_at = newest.starts_at, latest.duration_sec = newest.duration_sec,
       latest.laeq_centi_db = newest.laeq_centi_db, latest.lafmax_centi_db = newest.lafmax_centi_db,
       latest.flags = newest.flags, latest.wind_speed_centi_ms = newest.wind_speed_centi_ms,
       latest.battery_centi_v = newest.battery_centi_v`,
    [stationId],
  );
  if (changed.affectedRows > 0) return;
  await conn('station_latest')
    .where({ station_id: stationId })
    .whereNotExists(conn('interval_levels').where({ station_id: stationId }).select(conn.raw('1')).limit(1))
    .delete();
}

/** The newest interval of each station of a network that has posted. */
export async function listLatest(networkId: number, conn: Connection = pool()): Promise<LatestInterval[]> {
  const rows: Row[] = await selectLatest([networkId], conn);
  return rows.map(latestOf);
}

/** A newest interval with what its station is called and how often it measures. */
export interface StationLatest extends LatestInterval {
  networkId: number;
  code: string;
  intervalSec: number;
  retiredAt: Date | null;
}

/** As `listLatest`, of several networks, each with its station. */
export async function listLatestOfNetworks(
  networkIds: readonly number[],
  conn: Connection = pool(),
): Promise<StationLatest[]> {
  const rows: (Row & Omit<StationLatest, keyof LatestInterval>)[] = await selectLatest(
    networkIds,
    conn,
  ).select({
    networkId: 'stations.network_id',
    code: 'stations.code',
    intervalSec: 'stations.interval_sec',
    retiredAt: 'stations.retired_at',
  });
  return rows.map(({ networkId, code, intervalSec, retiredAt, ...row }) => ({
    ...latestOf(row),
    networkId,
    code,
    intervalSec,
    retiredAt,
  }));
}

type Row = Omit<LatestInterval, 'windSpeedMs' | 'batteryV'> & { wind: number | null; battery: number | null };

function selectLatest(networkIds: readonly number[], conn: Connection) {
  return conn('station_latest')
    .join('stations', 'stations.id', 'station_latest.station_id')
    .whereIn('stations.network_id', [...networkIds])
    .select({
      stationId: 'station_id',
      startSec: 'starts_at',
      durationSec: 'duration_sec',
      laeqCentiDb: 'laeq_centi_db',
      lafmaxCentiDb: 'lafmax_centi_db',
      flags: 'flags',
      wind: 'wind_speed_centi_ms',
      battery: 'battery_centi_v',
      receivedAt: 'received_at',
    });
}

function latestOf({ wind, battery, ...row }: Row): LatestInterval {
  return {
    ...row,
    windSpeedMs: wind === null ? null : wind / 100,
    batteryV: battery === null ? null : battery / 100,
  };
}
