import { createHash } from 'node:crypto';
import type { FigureChange } from '#lib/contracts/summaryLife';
import { pool, type Connection } from './connection';
import { jsonOf } from './json';

/** What has changed since a month was issued, put before the operator. */
export interface SummaryProposalRow {
  id: number;
  networkId: number;
  month: string;
  ofRevision: number;
  changes: FigureChange[];
  foundAt: Date;
  state: 'open' | 'accepted' | 'dismissed' | 'replaced';
  decidedAt: Date | null;
  reason: string | null;
}

const COLUMNS = {
  id: 'id',
  networkId: 'network_id',
  month: 'month',
  ofRevision: 'of_revision',
  changes: 'changes',
  foundAt: 'found_at',
  state: 'state',
  decidedAt: 'decided_at',
  reason: 'reason',
} as const;

const rowOf = (row: SummaryProposalRow): SummaryProposalRow => ({
  ...row,
  changes: jsonOf<FigureChange[]>(row.changes),
});

/** Proposals of a network, of one month where it is given; latest first. */
export async function listProposals(
  networkId: number,
  month: string | null = null,
  conn: Connection = pool(),
): Promise<SummaryProposalRow[]> {
  const rows: SummaryProposalRow[] = await conn('summary_proposals')
    .where({ network_id: networkId, ...(month === null ? {} : { month }) })
    .orderBy('id', 'desc')
    .select(COLUMNS);
  return rows.map(rowOf);
}

/** A proposal, locked until the transaction ends. */
export async function lockProposal(
  networkId: number,
  id: number,
  transaction: Connection,
): Promise<SummaryProposalRow | undefined> {
  const row: SummaryProposalRow | undefined = await transaction('summary_proposals')
    .where({ network_id: networkId, id })
    .forUpdate()
    .first(COLUMNS);
  return row && rowOf(row);
}

/**
 * Adds a proposal in the place of what was open; false when these very changes were proposed before: they are open again, unless
 * somebody has decided on them.
 */
export async function insertProposal(
  {
    networkId,
    month,
    ofRevision,
    changes,
  }: Pick<SummaryProposalRow, 'networkId' | 'month' | 'ofRevision' | 'changes'>,
  transaction: Connection,
): Promise<boolean> {
  const text = JSON.stringify(changes);
  const digest = createHash('sha256')
    .update(JSON.stringify(changes.map(({ station, figure, new: now }) => [station, figure, now])))
    .digest();
  await replaceOpenProposals({ networkId, month }, digest, transaction);
  try {
    await transaction('summary_proposals').insert({
      network_id: networkId,
      month,
      of_revision: ofRevision,
      changes_sha256: digest,
      changes: text,
      found_at: new Date(),
    });
    return true;
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    await transaction('summary_proposals')
      .where({
        network_id: networkId,
        month,
        of_revision: ofRevision,
        changes_sha256: digest,
        state: 'replaced',
      })
      .update({ state: 'open' });
    return false;
  }
}

/** Open proposals of a month but the one with these changes no longer hold. */
export async function replaceOpenProposals(
  { networkId, month }: Pick<SummaryProposalRow, 'networkId' | 'month'>,
  exceptDigest: Buffer | null,
  transaction: Connection,
): Promise<void> {
  const open = transaction('summary_proposals').where({ network_id: networkId, month, state: 'open' });
  if (exceptDigest) void open.whereNot({ changes_sha256: exceptDigest });
  await open.update({ state: 'replaced' });
}

export async function decideProposal(
  id: number,
  decision: { state: 'accepted' | 'dismissed'; by: string; reason: string },
  transaction: Connection,
): Promise<void> {
  await transaction('summary_proposals').where({ id }).update({
    state: decision.state,
    decided_by: decision.by,
    decided_at: new Date(),
    reason: decision.reason,
  });
}

/** Months of a network with a proposal that waits for a decision. */
export async function listOpenProposalMonths(
  networkId: number,
  conn: Connection = pool(),
): Promise<string[]> {
  return conn('summary_proposals').where({ network_id: networkId, state: 'open' }).distinct().pluck('month');
}
