import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findExclusion, readExclusion, withdrawExclusion } from '#db/queries/exclusions';
import { lockStation } from '#db/queries/stations';
import { type Exclusion } from '#lib/contracts/exclusions';
import { exclusionJson } from './exclusionJson';
import { markTouched } from './touched';

export type Withdrawal =
  { outcome: 'withdrawn'; exclusion: Exclusion } | { outcome: 'withdrawn-before' } | { outcome: 'unknown' };

/** Withdraws an exclusion: what it left out counts again. The exclusion is kept, with both reasons. */
export async function withdraw(request: {
  networkId: number;
  id: number;
  reason: string;
  userId: string;
}): Promise<Withdrawal> {
  const { networkId, id, reason, userId } = request;
  const found = await findExclusion(networkId, id);
  if (!found) return { outcome: 'unknown' };
  return inTransaction<Withdrawal>(async (transaction) => {
    await lockStation(found.stationId, transaction);
    const changed = await withdrawExclusion(id, { by: userId, reason }, transaction);
    if (!changed) return { outcome: 'withdrawn-before' };
    await markTouched(found.stationId, found, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'exclusion.withdraw',
        subject: `station ${found.stationCode}`,
        detail: { exclusion: id, reason },
      },
      transaction,
    );
    return {
      outcome: 'withdrawn',
      exclusion: exclusionJson(await readExclusion(networkId, id, transaction)),
    };
  });
}
