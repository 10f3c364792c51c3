import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { lockQuarantined, settleQuarantined, type QuarantineState } from '#db/queries/quarantine';
import { findStationById } from '#db/queries/stations';
import { type SettledOutcome } from '#lib/contracts/quarantine';
import { choose, type Choice, type Chosen } from './choice';

interface Act {
  action: 'quarantine.dismiss' | 'quarantine.reopen';
  /** The state that a record must have. */
  from: QuarantineState;
  userId: string;
  networkId: number;
  reason: string | null;
}

/** Settles open records as not to be taken. They are kept, and can be reopened. */
export function dismiss(
  choice: Choice,
  by: { userId: string; networkId: number; reason: string },
): Promise<SettledOutcome> {
  return settle(choice, { action: 'quarantine.dismiss', from: 'open', ...by });
}

/** Undoes dismissals: the records are open again. */
export function reopen(choice: Choice, by: { userId: string; networkId: number }): Promise<SettledOutcome> {
  return settle(choice, { action: 'quarantine.reopen', from: 'dismissed', reason: null, ...by });
}

async function settle(choice: Choice, act: Act): Promise<SettledOutcome> {
  const chosen = await choose(choice);
  let settled = 0;
  let passedOver = chosen.unknownCount;
  for (const part of chosen.parts) {
    const done = await settlePart(part, act);
    settled += done;
    passedOver += part.ids.length - done;
  }
  return { settled, passedOver, isMoreLeft: chosen.isMoreLeft };
}

function settlePart({ stationId, ids }: Chosen['parts'][number], act: Act): Promise<number> {
  const { action, from, userId, networkId, reason } = act;
  return inTransaction(async (transaction) => {
    const fitting = (await lockQuarantined(stationId, ids, [from], transaction)).map(({ id }) => Number(id));
    if (fitting.length === 0) return 0;
    const isDismissal = action === 'quarantine.dismiss';
    await settleQuarantined(
      fitting,
      isDismissal ? { as: 'dismissed', by: userId, reason } : null,
      transaction,
    );
    const station = await findStationById(stationId, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action,
        subject: `station ${station?.code ?? stationId}`,
        detail: { records: fitting, ...(reason === null ? {} : { reason }) },
      },
      transaction,
    );
    return fitting.length;
  });
}
