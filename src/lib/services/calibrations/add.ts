import { appendAudit } from '#db/queries/audit';
import {
  findCalibration,
  insertCalibration,
  setCertificate,
  type Certificate,
} from '#db/queries/calibrations';
import { calibrationSettingsOf } from '#db/queries/calibrationSettings';
import { inTransaction, type Connection } from '#db/queries/connection';
import { listDeploymentsOf } from '#db/queries/deployments';
import { findInstrument, lockInstrument } from '#db/queries/instruments';
import { toCentiDb } from '#lib/acoustics/rounding';
import { type Calibration, type NewCalibration } from '#lib/contracts/calibrations';
import { isInForce } from '../instruments/instrumentJson';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { calibrationJson } from './calibrationJson';

export const NO_CHECK = unknown('The network has no calibration check with this number.');

/** A check may be noted with a clock a little ahead, not for a day to come. */
const MOST_AHEAD_SEC = 3600;

interface Act {
  networkId: number;
  userId: string;
  nowSec: number;
}

/** Notes a check of an instrument, with its certificate when there is one already written to disk. */
export function addCalibration(
  { networkId, userId, nowSec }: Act,
  input: NewCalibration,
  certificate: Certificate | null = null,
): Promise<Outcome<Calibration>> {
  return inTransaction<Outcome<Calibration>>(async (transaction) => {
    await lockInstrument(input.instrument, transaction);
    const instrument = await findInstrument(networkId, input.instrument, transaction);
    if (!instrument) return invalid('instrument', 'is not an instrument of this network');
    if (input.checkedAt > nowSec + MOST_AHEAD_SEC) return invalid('checkedAt', 'is still to come');
    const stays = await listDeploymentsOf(instrument.id, transaction);
    // A check closes a stay as often as it opens one: then it was made where the instrument had stood until that moment.
    const stay =
      stays.find((one) => isInForce(one, input.checkedAt)) ??
      stays.find((one) => isInForce(one, input.checkedAt - 1));
    const { driftBoundCentiDb } = await calibrationSettingsOf(networkId, transaction);
    const row = {
      networkId,
      instrumentId: instrument.id,
      stationId: stay?.stationId ?? null,
      checkedAtSec: input.checkedAt,
      calibrator: input.calibrator,
      calibratorCentiDb: toCentiDb(input.calibratorLevel),
      beforeCentiDb: toCentiDb(input.before),
      afterCentiDb: input.after === null ? null : toCentiDb(input.after),
      driftBoundCentiDb,
      checkedBy: input.checkedBy,
      note: input.note,
    };
    const id = await insertCalibration({ ...row, createdBy: userId }, transaction);
    if (certificate) await setCertificate(id, certificate, userId, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'calibration.add',
        subject: `instrument ${instrument.serialNumber}`,
        detail: { calibration: id, after: row, ...(certificate && certificateDetail(certificate)) },
      },
      transaction,
    );
    return done(calibrationJson(await readCalibration(networkId, id, transaction)));
  });
}

/** A certificate for the audit. */
export function certificateDetail({ mediaType, byteCount, sha256 }: Certificate) {
  return { certificate: { type: mediaType, bytes: byteCount, sha256: sha256.toString('hex') } };
}

/** A check that must be there. */
export async function readCalibration(networkId: number, id: number, transaction: Connection) {
  const row = await findCalibration(networkId, id, transaction);
  if (!row) throw new Error(`There is no calibration check ${id} in network ${networkId}.`);
  return row;
}
