import { type ActivityRow, type NewActivity as StoredActivity } from '#db/queries/activities';
import { type Activity, type NewActivity } from '#lib/contracts/activities';
import { formatInstantUtc } from '#lib/contracts/common';

/** An entry of the operations log as it is stored. */
export function storedActivity({ kind, place, from, to, note }: NewActivity): StoredActivity {
  return { kind, place, fromSec: from, toSec: to, note };
}

/** An entry of the operations log as the interface gives it. */
export function activityJson(row: ActivityRow): Activity {
  return {
    id: row.id,
    kind: row.kind,
    place: row.place,
    from: formatInstantUtc(row.fromSec),
    to: formatInstantUtc(row.toSec),
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
