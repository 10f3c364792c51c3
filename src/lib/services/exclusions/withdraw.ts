import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  findExclusion,
  listExclusionsOfAct,
  readExclusion,
  withdrawExclusion,
  type ExclusionRow,
} from '#db/queries/exclusions';
import { lockStation } from '#db/queries/stations';
import { type Exclusion } from '#lib/contracts/exclusions';
import { requireUnsealed } from '../retention/seal';
import { exclusionJson } from './exclusionJson';
import { markTouched } from './touched';

type Nothing = { outcome: 'withdrawn-before' } | { outcome: 'unknown' };
export type Withdrawal = { outcome: 'withdrawn'; exclusion: Exclusion } | Nothing;
export type ActWithdrawal = { outcome: 'withdrawn'; exclusions: Exclusion[] } | Nothing;

interface WithdrawalRequest {
  networkId: number;
  /** Of the exclusion, or of the act. */
  id: number;
  reason: string;
  userId: string;
}

/** Withdraws an exclusion: what it left out counts again. The exclusion is kept, with both reasons. */
export async function withdraw(request: WithdrawalRequest): Promise<Withdrawal> {
  const found = await findExclusion(request.networkId, request.id);
  if (!found) return { outcome: 'unknown' };
  return inTransaction<Withdrawal>(async (transaction) => {
    await lockStation(found.stationId, transaction);
    const exclusion = await withdrawFound(found, request, transaction);
    return exclusion ? { outcome: 'withdrawn', exclusion } : { outcome: 'withdrawn-before' };
  });
}

/** Withdraws every exclusion of an act that still stands, at all of its stations or at none. */
export async function withdrawAct(request: WithdrawalRequest): Promise<ActWithdrawal> {
  const ofAct = await listExclusionsOfAct(request.networkId, request.id);
  if (ofAct.length === 0) return { outcome: 'unknown' };
  return inTransaction<ActWithdrawal>(async (transaction) => {
    for (const { stationId } of ofAct) await lockStation(stationId, transaction);
    const exclusions: Exclusion[] = [];
    for (const found of ofAct) {
      const exclusion = await withdrawFound(found, request, transaction);
      if (exclusion) exclusions.push(exclusion);
    }
    return exclusions.length > 0 ? { outcome: 'withdrawn', exclusions } : { outcome: 'withdrawn-before' };
  });
}

/** Withdraws an exclusion whose station is locked; null when it was withdrawn before. */
async function withdrawFound(
  { id, stationId, stationCode, fromSec, toSec, actId }: ExclusionRow,
  { networkId, reason, userId }: WithdrawalRequest,
  transaction: Connection,
): Promise<Exclusion | null> {
  await requireUnsealed(stationId, fromSec, transaction);
  const changed = await withdrawExclusion(id, { by: userId, reason }, transaction);
  if (!changed) return null;
  await markTouched(stationId, { fromSec, toSec }, transaction);
  await appendAudit(
    {
      userId,
      networkId,
      action: 'exclusion.withdraw',
      subject: `station ${stationCode}`,
      detail: { exclusion: id, ...(actId !== null && { act: actId }), reason },
    },
    transaction,
  );
  return exclusionJson(await readExclusion(networkId, id, transaction));
}
