import type { BandFraction } from '#lib/acoustics/bands';
import { pool, type Connection } from './connection';

export type Placement = 'free-field' | 'facade';

export interface StationRow {
  id: number;
  networkId: number;
  code: string;
  name: string;
  latitude: number;
  longitude: number;
  bandFraction: BandFraction;
  intervalSec: number;
  firstBandIndex: number;
  lastBandIndex: number;
  placement: Placement;
  /** Taken off a level measured at a façade when incident sound is reported, dB. */
  facadeCorrectionDb: number;
  mastHeightM: number | null;
  surroundings: string;
  /** Epoch seconds; older intervals are refused; null: no bound. */
  acceptsFromSec: number | null;
  /** Flags that are ordinary here, as bits; any other that comes often is a trouble. They decide nothing about validity. */
  expectedFlags: number;
  createdAt: Date;
  retiredAt: Date | null;
}

const STATION_COLUMNS = {
  id: 'id',
  networkId: 'network_id',
  code: 'code',
  name: 'name',
  latitude: 'latitude',
  longitude: 'longitude',
  bandFraction: 'band_fraction',
  intervalSec: 'interval_sec',
  firstBandIndex: 'first_band_index',
  lastBandIndex: 'last_band_index',
  placement: 'placement',
  facadeCorrectionDb: 'facade_correction_db',
  mastHeightM: 'mast_height_m',
  surroundings: 'surroundings',
  acceptsFromSec: 'accepts_from',
  expectedFlags: 'expected_flags',
  createdAt: 'created_at',
  retiredAt: 'retired_at',
} as const;

export async function findStation(
  networkId: number,
  code: string,
  conn: Connection = pool(),
): Promise<StationRow | undefined> {
  return conn('stations').where({ network_id: networkId, code }).first(STATION_COLUMNS);
}

export async function findStationById(
  id: number,
  conn: Connection = pool(),
): Promise<StationRow | undefined> {
  return conn('stations').where({ id }).first(STATION_COLUMNS);
}

/**
 * Locks a station until the transaction ends. Whoever changes its intervals, what decides which of them count, or what is
 * computed from them, holds this lock, so that each sees the other's whole work or nothing of it.
 */
export async function lockStation(id: number, transaction: Connection): Promise<void> {
  const [rows] = (await transaction.raw(
    'SELECT station_id FROM station_locks WHERE station_id = ? FOR UPDATE',
    [id],
  )) as [unknown[]];
  if (rows.length === 0) await insertLock(id, transaction);
}

/** The lock of a station stands beside its intervals, which may be on another server than the station itself. */
async function insertLock(id: number, conn: Connection): Promise<void> {
  await conn.raw('INSERT IGNORE INTO station_locks (station_id) VALUES (?)', [id]);
}

/** Stations of a network by code; retired ones too. */
export async function listStations(networkId: number, conn: Connection = pool()): Promise<StationRow[]> {
  return conn('stations').where({ network_id: networkId }).orderBy('code').select(STATION_COLUMNS);
}

/** Ids of every station of every network. */
export async function listStationIds(conn: Connection = pool()): Promise<number[]> {
  return conn('stations').orderBy('id').pluck('id');
}

/** What is left out holds as the table says. */
type Defaulted = 'facadeCorrectionDb' | 'expectedFlags';
export type NewStation = Omit<StationRow, 'id' | 'createdAt' | 'retiredAt' | Defaulted> &
  Partial<Pick<StationRow, Defaulted>>;

/** Adds a station and answers its id. A code that the network has already fails with MariaDB's duplicate-key error. */
export async function insertStation(station: NewStation, conn: Connection): Promise<number> {
  const [id] = await conn('stations').insert({ ...columnsOf(station), created_at: new Date() });
  await insertLock(Number(id), conn);
  return Number(id);
}

export async function updateStation(
  id: number,
  changes: Partial<Omit<StationRow, 'id' | 'networkId' | 'createdAt'>>,
  conn: Connection,
): Promise<void> {
  await conn('stations').where({ id }).update(columnsOf(changes));
}

function columnsOf(values: Partial<StationRow>): Record<string, unknown> {
  return Object.fromEntries(
    Object.entries(values).map(([key, value]) => [
      STATION_COLUMNS[key as keyof typeof STATION_COLUMNS],
      value,
    ]),
  );
}
