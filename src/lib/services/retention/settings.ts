import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { keepMonthsOf, latestSeal, setKeepMonths, type Seal } from '#db/queries/retention';

export interface Retention {
  /** Null: single intervals are kept for good. */
  keepMonths: number | null;
  /** How far it has come; null: nothing was sealed yet. */
  seal: Seal | null;
}

/** For how long a network keeps single intervals, and what is gone. */
export async function retentionOf(networkId: number): Promise<Retention> {
  const [keepMonths, seal] = await Promise.all([keepMonthsOf(networkId), latestSeal(networkId)]);
  return { keepMonths, seal };
}

/** Changes for how long; what is gone does not come back. */
export async function changeRetention(
  { networkId, userId }: { networkId: number; userId: string },
  keepMonths: number | null,
): Promise<void> {
  await inTransaction(async (transaction) => {
    const before = await keepMonthsOf(networkId, transaction);
    if (before === keepMonths) return;
    await setKeepMonths(networkId, keepMonths, userId, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'network.retention',
        subject: `network ${networkId}`,
        detail: { before, after: keepMonths },
      },
      transaction,
    );
  });
}
