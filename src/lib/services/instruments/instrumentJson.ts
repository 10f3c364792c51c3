import { type DeploymentRow } from '#db/queries/deployments';
import { type InstrumentRow } from '#db/queries/instruments';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Deployment, type Instrument } from '#lib/contracts/instruments';

/** A stay of an instrument at a station as the interface gives it. */
export function deploymentJson(row: DeploymentRow): Deployment {
  return {
    id: row.id,
    serialNumber: row.serialNumber,
    station: row.stationCode,
    from: formatInstantUtc(row.startSec),
    to: row.endSec === null ? null : formatInstantUtc(row.endSec),
    note: row.note,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdByName,
    withdrawal: row.withdrawnAt && {
      at: row.withdrawnAt.toISOString(),
      by: row.withdrawnByName,
      reason: row.withdrawalReason ?? '',
    },
  };
}

/** An instrument as the interface gives it; `deployments` are its own. */
export function instrumentJson(
  row: InstrumentRow,
  deployments: readonly DeploymentRow[],
  nowSec: number,
): Instrument {
  const present = deployments.find((one) => isInForce(one, nowSec));
  return {
    id: row.id,
    serialNumber: row.serialNumber,
    class: row.class,
    description: row.description,
    microphone: row.microphone,
    createdAt: row.createdAt.toISOString(),
    retiredAt: row.retiredAt?.toISOString() ?? null,
    deployment: present ? deploymentJson(present) : null,
  };
}

/** Whether an instrument stands at its station at an instant by this deployment. */
export function isInForce(
  { withdrawnAt, startSec, endSec }: Pick<DeploymentRow, 'withdrawnAt' | 'startSec' | 'endSec'>,
  atSec: number,
): boolean {
  return withdrawnAt === null && startSec <= atSec && (endSec === null || endSec > atSec);
}
