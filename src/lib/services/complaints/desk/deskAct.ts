import { appendAudit } from '#db/queries/audit';
import { lockComplaint, type ComplaintRow } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';

/** Whose act it is, and on which complaint. */
export interface DeskAct {
  userId: string;
  network: NetworkRow;
  reference: string;
}

export type DeskOutcome = { kind: 'done' } | { kind: 'unknown' } | { kind: 'refused'; message: string };

/** What an act notes in the audit trail: never a personal value. */
interface Noted {
  action: string;
  detail: Record<string, unknown>;
}

/**
 * Does something to a complaint, locked, in a transaction with its audit row. `act` answers what to note, or a message that says why
 * nothing is changed.
 */
export async function actOnComplaint(
  { userId, network, reference }: DeskAct,
  act: (complaint: ComplaintRow, transaction: Connection) => Promise<Noted | string>,
): Promise<DeskOutcome> {
  return inTransaction(async (transaction) => {
    const complaint = await lockComplaint(network.id, reference, transaction);
    if (!complaint) return { kind: 'unknown' };
    const outcome = await act(complaint, transaction);
    if (typeof outcome === 'string') return { kind: 'refused', message: outcome };
    const subject = `complaint ${complaint.reference}`;
    await appendAudit({ userId, networkId: network.id, subject, ...outcome }, transaction);
    return { kind: 'done' };
  });
}
