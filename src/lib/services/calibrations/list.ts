import { findCalibration, listCalibrations } from '#db/queries/calibrations';
import { type Calibration } from '#lib/contracts/calibrations';
import { csvText } from '#lib/format/csvText';
import { calibrationJson } from './calibrationJson';
import { readCertificate } from './certificate';

/** Checks of a network, latest first, withdrawn ones too; of one instrument where it is given. */
export async function calibrationsOf(
  networkId: number,
  instrumentId: number | null = null,
): Promise<Calibration[]> {
  return (await listCalibrations(networkId, instrumentId)).map(calibrationJson);
}

const HEADER = [
  'serialNumber',
  'station',
  'checkedAt',
  'calibrator',
  'calibratorLevel',
  'before',
  'after',
  'drift',
  'driftBound',
  'isWithinBound',
  'checkedBy',
  'note',
  'certificateSha256',
  'withdrawnBecause',
];

/** Every check of a network's instruments, latest first. Levels in dB at 1 kHz. */
export async function calibrationsCsv(networkId: number): Promise<string> {
  const rows = (await calibrationsOf(networkId)).map((one) => [
    one.serialNumber,
    one.station,
    one.checkedAt,
    one.calibrator,
    one.calibratorLevel,
    one.before,
    one.after,
    one.drift,
    one.driftBound,
    one.isWithinBound,
    one.checkedBy,
    one.note,
    one.certificate?.sha256 ?? null,
    one.withdrawal?.reason ?? null,
  ]);
  return csvText([HEADER, ...rows]);
}

export interface CertificateFile {
  bytes: Buffer;
  type: string;
  /** Without its ending. */
  name: string;
}

/** The certificate of a check; null when it has none, or the file is not what was uploaded. */
export async function certificateOf(networkId: number, id: number): Promise<CertificateFile | null> {
  const row = await findCalibration(networkId, id);
  if (!row?.certificateSha256 || !row.certificateType) return null;
  const bytes = await readCertificate(row.certificateSha256);
  const day = new Date(row.checkedAtSec * 1000).toISOString().slice(0, 10);
  return bytes && { bytes, type: row.certificateType, name: `${row.serialNumber}_${day}` };
}
