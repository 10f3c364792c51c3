import { type ExclusionRow } from '#db/queries/exclusions';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Exclusion } from '#lib/contracts/exclusions';

/** An exclusion as the interface gives it. */
export function exclusionJson(row: ExclusionRow): Exclusion {
  return {
    id: row.id,
    act: row.actId,
    station: row.stationCode,
    from: formatInstantUtc(row.fromSec),
    to: formatInstantUtc(row.toSec),
    reason: row.reason,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdByName,
    withdrawal: row.withdrawnAt && {
      at: row.withdrawnAt.toISOString(),
      by: row.withdrawnByName,
      reason: row.withdrawalReason ?? '',
    },
  };
}
