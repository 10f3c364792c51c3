import { listCalibrations } from '#db/queries/calibrations';
import { calibrationSettingsOf } from '#db/queries/calibrationSettings';
import { listDeployments } from '#db/queries/deployments';
import { listInstruments } from '#db/queries/instruments';
import { type DueCheck } from '#lib/contracts/calibrations';
import { formatInstantUtc } from '#lib/contracts/common';
import { addDays, localDateAt, type LocalDate } from '#lib/time/zone';
import { isInForce } from '../instruments/instrumentJson';

/** Whether a check due on a date is to be thought of on `today`. */
export function dueState(dueOn: LocalDate, today: LocalDate, remindBeforeDays: number): DueCheck['state'] {
  if (dueOn < today) return 'overdue';
  return addDays(dueOn, -remindBeforeDays) <= today ? 'soon' : 'fine';
}

/**
 * When each instrument in use is to be checked next, soonest first: so many days after its last check, by the network's
 * calendar; one that was never checked, from the day on which it was added.
 */
export async function dueChecks(networkId: number, zone: string, nowSec: number): Promise<DueCheck[]> {
  const [instruments, deployments, calibrations, settings] = await Promise.all([
    listInstruments(networkId),
    listDeployments(networkId),
    listCalibrations(networkId),
    calibrationSettingsOf(networkId),
  ]);
  const today = localDateAt(nowSec, zone);
  return instruments
    .filter(({ retiredAt }) => retiredAt === null)
    .map((instrument): DueCheck => {
      const last = calibrations.find((one) => one.instrumentId === instrument.id && one.withdrawnAt === null);
      const stay = deployments.find((one) => one.instrumentId === instrument.id && isInForce(one, nowSec));
      const dueOn = last
        ? addDays(localDateAt(last.checkedAtSec, zone), settings.checkEveryDays)
        : localDateAt(Math.floor(instrument.createdAt.getTime() / 1000), zone);
      return {
        instrument: instrument.id,
        serialNumber: instrument.serialNumber,
        station: stay?.stationCode ?? null,
        lastCheckedAt: last ? formatInstantUtc(last.checkedAtSec) : null,
        dueOn,
        state: dueState(dueOn, today, settings.remindBeforeDays),
      };
    })
    .sort((a, b) => (a.dueOn === b.dueOn ? 0 : a.dueOn < b.dueOn ? -1 : 1));
}
