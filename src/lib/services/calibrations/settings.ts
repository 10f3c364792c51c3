import { appendAudit } from '#db/queries/audit';
import { calibrationSettingsOf, setCalibrationSettings } from '#db/queries/calibrationSettings';
import { inTransaction } from '#db/queries/connection';
import { toCentiDb } from '#lib/acoustics/rounding';
import { type CalibrationSettingsJson } from '#lib/contracts/calibrations';
import { settingsJson } from './calibrationJson';

/** How a network checks its instruments. */
export async function calibrationSettings(networkId: number): Promise<CalibrationSettingsJson> {
  return settingsJson(await calibrationSettingsOf(networkId));
}

/** Says how a network checks its instruments from now on; a check noted before keeps the bound that it was judged by. */
export function changeCalibrationSettings(
  networkId: number,
  { driftBound, ...others }: CalibrationSettingsJson,
  userId: string,
): Promise<CalibrationSettingsJson> {
  const after = { driftBoundCentiDb: toCentiDb(driftBound), ...others };
  return inTransaction(async (transaction) => {
    const before = await calibrationSettingsOf(networkId, transaction);
    await setCalibrationSettings(networkId, after, userId, transaction);
    const detail = { before, after };
    await appendAudit(
      { userId, networkId, action: 'calibration-settings.change', subject: `network ${networkId}`, detail },
      transaction,
    );
    return settingsJson(after);
  });
}
