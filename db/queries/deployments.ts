import { pool, type Connection } from './connection';

/** A stretch of time that an instrument stood at a station. Half-open, epoch seconds. */
export interface DeploymentRow {
  id: number;
  networkId: number;
  instrumentId: number;
  serialNumber: string;
  stationId: number;
  stationCode: string;
  stationName: string;
  startSec: number;
  /** Null: it is still there. */
  endSec: number | null;
  note: string;
  createdAt: Date;
  createdByName: string | null;
  /** Set: it was noted by mistake. */
  withdrawnAt: Date | null;
  withdrawnByName: string | null;
  withdrawalReason: string | null;
}

const COLUMNS = {
  id: 'deployments.id',
  networkId: 'deployments.network_id',
  instrumentId: 'deployments.instrument_id',
  serialNumber: 'instruments.serial_number',
  stationId: 'deployments.station_id',
  stationCode: 'stations.code',
  stationName: 'stations.name',
  startSec: 'deployments.starts_at',
  endSec: 'deployments.ends_at',
  note: 'deployments.note',
  createdAt: 'deployments.created_at',
  createdByName: 'creator.name',
  withdrawnAt: 'deployments.withdrawn_at',
  withdrawnByName: 'withdrawer.name',
  withdrawalReason: 'deployments.withdrawal_reason',
} as const;

function selectDeployments(conn: Connection) {
  return conn('deployments')
    .join('instruments', 'instruments.id', 'deployments.instrument_id')
    .join('stations', 'stations.id', 'deployments.station_id')
    .leftJoin({ creator: 'users' }, 'creator.id', 'deployments.created_by')
    .leftJoin({ withdrawer: 'users' }, 'withdrawer.id', 'deployments.withdrawn_by')
    .select(COLUMNS);
}

/** Deployments of a network, latest beginning first; withdrawn ones too. */
export async function listDeployments(
  networkId: number,
  conn: Connection = pool(),
): Promise<DeploymentRow[]> {
  return selectDeployments(conn)
    .where('deployments.network_id', networkId)
    .orderBy([
      { column: 'deployments.starts_at', order: 'desc' },
      { column: 'deployments.id', order: 'desc' },
    ]);
}

/** Deployments of an instrument, latest beginning first; withdrawn ones too. */
export async function listDeploymentsOf(
  instrumentId: number,
  conn: Connection = pool(),
): Promise<DeploymentRow[]> {
  return selectDeployments(conn)
    .where('deployments.instrument_id', instrumentId)
    .orderBy([
      { column: 'deployments.starts_at', order: 'desc' },
      { column: 'deployments.id', order: 'desc' },
    ]);
}

export async function findDeployment(
  instrumentId: number,
  id: number,
  conn: Connection = pool(),
): Promise<DeploymentRow | undefined> {
  return selectDeployments(conn)
    .where({ 'deployments.instrument_id': instrumentId, 'deployments.id': id })
    .first();
}

export interface Stay {
  instrumentId: number;
  stationId: number;
  startSec: number;
  endSec: number | null;
}

/** Standing deployments of the same instrument or at the same station that overlap a stay; `exceptId` is left out. */
export async function selectOverlapping(
  stay: Stay,
  exceptId: number | null,
  conn: Connection,
): Promise<DeploymentRow[]> {
  const rows = selectDeployments(conn)
    .whereNull('deployments.withdrawn_at')
    .where((query) =>
      query
        .where('deployments.instrument_id', stay.instrumentId)
        .orWhere('deployments.station_id', stay.stationId),
    )
    .where((query) =>
      query.whereNull('deployments.ends_at').orWhere('deployments.ends_at', '>', stay.startSec),
    )
    .orderBy('deployments.starts_at');
  if (stay.endSec !== null) rows.where('deployments.starts_at', '<', stay.endSec);
  if (exceptId !== null) rows.whereNot('deployments.id', exceptId);
  return rows;
}

/** Adds a deployment and answers its id; the caller holds the locks of instrument and station. */
export async function insertDeployment(
  deployment: Stay & { networkId: number; note: string; createdBy: string },
  conn: Connection,
): Promise<number> {
  const [id] = await conn('deployments').insert({
    network_id: deployment.networkId,
    instrument_id: deployment.instrumentId,
    station_id: deployment.stationId,
    starts_at: deployment.startSec,
    ends_at: deployment.endSec,
    note: deployment.note,
    created_by: deployment.createdBy,
    created_at: new Date(),
  });
  return Number(id);
}

export async function endDeploymentAt(id: number, endSec: number, conn: Connection): Promise<void> {
  await conn('deployments').where({ id }).update({ ends_at: endSec });
}

/** Withdraws a deployment that stands; false when it was withdrawn before. */
export async function withdrawDeployment(
  id: number,
  withdrawal: { by: string; reason: string },
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('deployments').where({ id }).whereNull('withdrawn_at').update({
    withdrawn_by: withdrawal.by,
    withdrawn_at: new Date(),
    withdrawal_reason: withdrawal.reason,
  });
  return changed === 1;
}

/** Standing deployments at a station that overlap `fromSec <= t < toSec`, ascending. */
export async function selectStaysAt(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<DeploymentRow[]> {
  return selectDeployments(conn)
    .where('deployments.station_id', stationId)
    .whereNull('deployments.withdrawn_at')
    .where('deployments.starts_at', '<', toSec)
    .where((query) => query.whereNull('deployments.ends_at').orWhere('deployments.ends_at', '>', fromSec))
    .orderBy('deployments.starts_at');
}
