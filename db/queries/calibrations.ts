import { pool, type Connection } from './connection';

/** A check of an instrument with a calibrator. Levels in hundredths of a dB at 1 kHz, times in epoch seconds. */
export interface CalibrationRow {
  id: number;
  networkId: number;
  instrumentId: number;
  serialNumber: string;
  stationId: number | null;
  stationCode: string | null;
  checkedAtSec: number;
  calibrator: string;
  calibratorCentiDb: number;
  beforeCentiDb: number;
  /** Null: not adjusted. */
  afterCentiDb: number | null;
  driftBoundCentiDb: number;
  checkedBy: string;
  note: string;
  createdAt: Date;
  createdByName: string | null;
  withdrawnAt: Date | null;
  withdrawnByName: string | null;
  withdrawalReason: string | null;
  /** Null: no certificate. */
  certificateType: string | null;
  certificateBytes: number | null;
  certificateSha256: Buffer | null;
}

const COLUMNS = {
  id: 'calibrations.id',
  networkId: 'calibrations.network_id',
  instrumentId: 'calibrations.instrument_id',
  serialNumber: 'instruments.serial_number',
  stationId: 'calibrations.station_id',
  stationCode: 'stations.code',
  checkedAtSec: 'calibrations.checked_at',
  calibrator: 'calibrations.calibrator',
  calibratorCentiDb: 'calibrations.calibrator_centi_db',
  beforeCentiDb: 'calibrations.before_centi_db',
  afterCentiDb: 'calibrations.after_centi_db',
  driftBoundCentiDb: 'calibrations.drift_bound_centi_db',
  checkedBy: 'calibrations.checked_by',
  note: 'calibrations.note',
  createdAt: 'calibrations.created_at',
  createdByName: 'creator.name',
  withdrawnAt: 'calibrations.withdrawn_at',
  withdrawnByName: 'withdrawer.name',
  withdrawalReason: 'calibrations.withdrawal_reason',
  certificateType: 'certificates.media_type',
  certificateBytes: 'certificates.byte_count',
  certificateSha256: 'certificates.sha256',
} as const;

function selectCalibrations(conn: Connection) {
  return conn('calibrations')
    .join('instruments', 'instruments.id', 'calibrations.instrument_id')
    .leftJoin('stations', 'stations.id', 'calibrations.station_id')
    .leftJoin({ certificates: 'calibration_certificates' }, 'certificates.calibration_id', 'calibrations.id')
    .leftJoin({ creator: 'users' }, 'creator.id', 'calibrations.created_by')
    .leftJoin({ withdrawer: 'users' }, 'withdrawer.id', 'calibrations.withdrawn_by')
    .select(COLUMNS);
}

/** Checks of a network, latest first, withdrawn ones too; of one instrument where `instrumentId` is given. */
export async function listCalibrations(
  networkId: number,
  instrumentId: number | null = null,
  conn: Connection = pool(),
): Promise<CalibrationRow[]> {
  const rows = selectCalibrations(conn)
    .where('calibrations.network_id', networkId)
    .orderBy([
      { column: 'calibrations.checked_at', order: 'desc' },
      { column: 'calibrations.id', order: 'desc' },
    ]);
  if (instrumentId !== null) rows.where('calibrations.instrument_id', instrumentId);
  return rows;
}

export async function findCalibration(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<CalibrationRow | undefined> {
  return selectCalibrations(conn)
    .where({ 'calibrations.network_id': networkId, 'calibrations.id': id })
    .first();
}

export type NewCalibration = Pick<
  CalibrationRow,
  | 'networkId'
  | 'instrumentId'
  | 'stationId'
  | 'checkedAtSec'
  | 'calibrator'
  | 'calibratorCentiDb'
  | 'beforeCentiDb'
  | 'afterCentiDb'
  | 'driftBoundCentiDb'
  | 'checkedBy'
  | 'note'
> & { createdBy: string };

/** Adds a check and answers its id. */
export async function insertCalibration(check: NewCalibration, conn: Connection): Promise<number> {
  const [id] = await conn('calibrations').insert({
    network_id: check.networkId,
    instrument_id: check.instrumentId,
    station_id: check.stationId,
    checked_at: check.checkedAtSec,
    calibrator: check.calibrator,
    calibrator_centi_db: check.calibratorCentiDb,
    before_centi_db: check.beforeCentiDb,
    after_centi_db: check.afterCentiDb,
    drift_bound_centi_db: check.driftBoundCentiDb,
    checked_by: check.checkedBy,
    note: check.note,
    created_by: check.createdBy,
    created_at: new Date(),
  });
  return Number(id);
}

/** Withdraws a check that stands; false when it was withdrawn before. */
export async function withdrawCalibration(
  id: number,
  withdrawal: { by: string; reason: string },
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('calibrations').where({ id }).whereNull('withdrawn_at').update({
    withdrawn_by: withdrawal.by,
    withdrawn_at: new Date(),
    withdrawal_reason: withdrawal.reason,
  });
  return changed === 1;
}

export interface Certificate {
  mediaType: string;
  byteCount: number;
  sha256: Buffer;
}

/** Notes the certificate of a check; a later one takes the place of an earlier one, whose file stays. */
export async function setCertificate(
  calibrationId: number,
  { mediaType, byteCount, sha256 }: Certificate,
  uploadedBy: string,
  conn: Connection,
): Promise<void> {
  const row = {
    calibration_id: calibrationId,
    media_type: mediaType,
    byte_count: byteCount,
    sha256,
    uploaded_by: uploadedBy,
    uploaded_at: new Date(),
  };
  await conn('calibration_certificates').insert(row).onConflict('calibration_id').merge();
}
