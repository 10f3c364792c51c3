import { findActivity, insertActivities, withdrawActivity } from '#db/queries/activities';
import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { type Activity, type NewActivity } from '#lib/contracts/activities';
import { formatInstantUtc } from '#lib/contracts/common';
import { done, unknown, type Outcome } from '../outcome';
import { activityJson, storedActivity } from './activityJson';

const NO_ACTIVITY = unknown('The operations log has no entry with this number.');

/** Notes what the site did. */
export function noteActivity(
  networkId: number,
  input: NewActivity,
  userId: string,
): Promise<Outcome<Activity>> {
  return inTransaction<Outcome<Activity>>(async (transaction) => {
    const id = await insertActivities(networkId, [storedActivity(input)], userId, transaction);
    const { kind, place, note } = input;
    const detail = {
      activity: id,
      kind,
      place,
      from: formatInstantUtc(input.from),
      to: formatInstantUtc(input.to),
      note,
    };
    const told = await readActivity(networkId, id, transaction);
    await appendAudit(
      { userId, networkId, action: 'activity.note', subject: 'operations log', detail },
      transaction,
    );
    return told;
  });
}

/** Withdraws an entry that was noted by mistake: it is kept, with the reason, and counts no more. */
export function withdrawEntry(
  { networkId, id, userId }: { networkId: number; id: number; userId: string },
  reason: string,
): Promise<Outcome<Activity>> {
  return inTransaction<Outcome<Activity>>(async (transaction) => {
    const before = await findActivity(networkId, id, transaction);
    if (!before) return NO_ACTIVITY;
    if (!(await withdrawActivity(id, { by: userId, reason }, transaction))) {
      const detail = 'Somebody has withdrawn this entry already.';
      return { kind: 'before', code: 'withdrawn-before', detail };
    }
    const told = await readActivity(networkId, id, transaction);
    const detail = { activity: id, kind: before.kind, reason };
    await appendAudit(
      { userId, networkId, action: 'activity.withdraw', subject: 'operations log', detail },
      transaction,
    );
    return told;
  });
}

async function readActivity(
  networkId: number,
  id: number,
  transaction: Connection,
): Promise<Outcome<Activity>> {
  const row = await findActivity(networkId, id, transaction);
  return row ? done(activityJson(row)) : NO_ACTIVITY;
}
