import { appendAudit } from '#db/queries/audit';
import { settleQuarantined } from '#db/queries/quarantine';
import { type ReleaseOutcome } from '#lib/contracts/quarantine';
import { choose, type Choice } from '#lib/services/quarantine/choice';
import { releasePart } from './releasePart';

export interface Releasing {
  userId: string;
  networkId: number;
  reason: string | null;
}

const MOST_LISTED = 100;

/**
 * Takes refused records as a post would now: what refused them may have been put right. Those that can be stored are, with
 * marks for what must be recomputed; those that say what is stored already are settled; the others stay open.
 */
export async function release(
  choice: Choice,
  { userId, networkId, reason }: Releasing,
  now: Date,
): Promise<ReleaseOutcome> {
  const chosen = await choose(choice);
  const outcome: ReleaseOutcome = {
    released: 0,
    known: 0,
    refused: [],
    refusedCount: 0,
    passedOver: chosen.unknownCount,
    isMoreLeft: chosen.isMoreLeft,
  };
  for (const { stationId, ids } of chosen.parts) {
    const part = await releasePart(stationId, ids, now, async (done, station, transaction) => {
      const settled = [...done.releasedIds, ...done.knownIds];
      if (settled.length === 0) return;
      await settleQuarantined(settled, { as: 'released', by: userId, reason }, transaction);
      await appendAudit(
        {
          userId,
          networkId,
          action: 'quarantine.release',
          subject: `station ${station.code}`,
          detail: { stored: done.releasedIds, known: done.knownIds, reason },
        },
        transaction,
      );
    });
    outcome.released += part.releasedIds.length;
    outcome.known += part.knownIds.length;
    outcome.refusedCount += part.refused.length;
    outcome.refused.push(...part.refused.slice(0, MOST_LISTED - outcome.refused.length));
    outcome.passedOver += ids.length - part.releasedIds.length - part.knownIds.length - part.refused.length;
  }
  return outcome;
}
