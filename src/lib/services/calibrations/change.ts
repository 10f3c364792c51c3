import { appendAudit } from '#db/queries/audit';
import {
  findCalibration,
  setCertificate,
  withdrawCalibration,
  type CalibrationRow,
} from '#db/queries/calibrations';
import { inTransaction, type Connection } from '#db/queries/connection';
import { lockInstrument } from '#db/queries/instruments';
import { type Calibration } from '#lib/contracts/calibrations';
import { done, invalid, type Outcome } from '../outcome';
import { certificateDetail, NO_CHECK, readCalibration } from './add';
import { calibrationJson } from './calibrationJson';
import { certificateTypeOf, storeCertificate } from './certificate';

interface CheckAct {
  networkId: number;
  id: number;
  userId: string;
}

/** Withdraws a check that was noted by mistake: what it made doubtful is judged by the others. It is kept, with the reason. */
export function withdrawCheck(act: CheckAct, reason: string): Promise<Outcome<Calibration>> {
  return onCheck(act, async (check, transaction) => {
    const isWithdrawn = await withdrawCalibration(check.id, { by: act.userId, reason }, transaction);
    if (!isWithdrawn) {
      return {
        kind: 'before',
        code: 'withdrawn-before',
        detail: 'Somebody has withdrawn this check already.',
      };
    }
    return keep(act, check, 'calibration.withdraw', { reason }, transaction);
  });
}

/** Keeps the certificate of a check; what the bytes are is told from the bytes. */
export async function addCertificate(act: CheckAct, bytes: Uint8Array): Promise<Outcome<Calibration>> {
  if (!(await findCalibration(act.networkId, act.id))) return NO_CHECK;
  const type = certificateTypeOf(bytes);
  if (!type) return invalid('certificate', WRONG_TYPE);
  const certificate = await storeCertificate(bytes, type);
  return onCheck(act, async (check, transaction) => {
    await setCertificate(check.id, certificate, act.userId, transaction);
    return keep(act, check, 'calibration.certificate', certificateDetail(certificate), transaction);
  });
}

export const WRONG_TYPE = 'must be a PDF, PNG or JPEG file';

function onCheck(
  { networkId, id }: CheckAct,
  work: (check: CalibrationRow, transaction: Connection) => Promise<Outcome<Calibration>>,
): Promise<Outcome<Calibration>> {
  return inTransaction<Outcome<Calibration>>(async (transaction) => {
    const check = await findCalibration(networkId, id, transaction);
    if (!check) return NO_CHECK;
    await lockInstrument(check.instrumentId, transaction);
    return work(check, transaction);
  });
}

async function keep(
  { networkId, userId }: CheckAct,
  check: CalibrationRow,
  action: string,
  detail: Record<string, unknown>,
  transaction: Connection,
): Promise<Outcome<Calibration>> {
  const subject = `instrument ${check.serialNumber}`;
  await appendAudit(
    { userId, networkId, action, subject, detail: { calibration: check.id, ...detail } },
    transaction,
  );
  return done(calibrationJson(await readCalibration(networkId, check.id, transaction)));
}
