import type { ComplaintStatus } from '#lib/contracts/complaints';
import type { LocalDate } from '#lib/time/zone';
import { pool, type Connection } from './connection';

export async function assignComplaint(id: number, to: string | null, conn: Connection): Promise<void> {
  await conn('complaints').where({ id }).update({ assigned_to: to });
}

/** Closes a complaint as the repeat of another one, remembering what it was. */
export async function markMerged(
  { id, into, status }: { id: number; into: number; status: ComplaintStatus },
  at: Date,
  conn: Connection,
): Promise<void> {
  await conn('complaints').where({ id }).update({
    status: 'closed',
    closed_at: at,
    closing_reason: 'repeated',
    merged_into: into,
    merged_from_status: status,
  });
}

/** Puts a merged complaint back to what it was. */
export async function unmarkMerged(id: number, status: ComplaintStatus, conn: Connection): Promise<void> {
  await conn('complaints').where({ id }).update({
    status,
    closed_at: null,
    closing_reason: null,
    merged_into: null,
    merged_from_status: null,
  });
}

/** What a merged complaint was before; null where it is not merged. */
export async function statusBeforeMerge(id: number, conn: Connection): Promise<ComplaintStatus | null> {
  const row = await conn('complaints').where({ id }).whereNotNull('merged_into').first('merged_from_status');
  return row?.merged_from_status ?? null;
}

/** Whom complaints of a network can be assigned to: people who answer there and may sign in, by name. */
export async function listAnswerers(
  networkId: number,
  conn: Connection = pool(),
): Promise<{ id: string; name: string; email: string }[]> {
  return conn('memberships as m')
    .join('users as u', 'u.id', 'm.user_id')
    .where({ 'm.network_id': networkId, 'm.role': 'liaison' })
    .whereNull('u.disabled_at')
    .orderBy('u.name')
    .select({ id: 'u.id', name: 'u.name', email: 'u.email' });
}

/** An open complaint and who is to be reminded of it. */
export interface DueComplaint {
  id: number;
  reference: string;
  dueOn: LocalDate;
  assignedTo: string | null;
}

/** Open complaints due from one date to another, both included. */
export async function listDueBetween(
  networkId: number,
  fromDate: LocalDate,
  toDate: LocalDate,
  conn: Connection = pool(),
): Promise<DueComplaint[]> {
  return conn('complaints')
    .where({ network_id: networkId, status: 'open' })
    .whereBetween('due_on', [fromDate, toDate])
    .orderBy(['due_on', 'id'])
    .select({
      id: 'id',
      reference: 'reference',
      dueOn: conn.raw(`DATE_FORMAT(due_on, '%Y-%m-%d')`),
      assignedTo: 'assigned_to',
    });
}

/**
 * References of complaints that are over and whose personal data are still there, when nothing happened to them since an instant:
 * no answer, closing, addition or filed answer.
 */
export async function listOutlived(
  networkId: number,
  before: Date,
  limit: number,
  conn: Connection = pool(),
): Promise<string[]> {
  return conn('complaints as c')
    .join('complaint_keys as k', 'k.complaint_id', 'c.id')
    .where({ 'c.network_id': networkId })
    .whereNot({ 'c.status': 'open' })
    .whereRaw('COALESCE(c.closed_at, c.answered_at, c.created_at) < ?', [before])
    .whereNotExists(
      conn('complaint_replies').whereRaw('complaint_id = c.id').where('created_at', '>=', before),
    )
    .whereNotExists(
      conn('complaint_additions').whereRaw('complaint_id = c.id').where('created_at', '>=', before),
    )
    .whereNotExists(
      conn('complaint_received').whereRaw('complaint_id = c.id').where('received_at', '>=', before),
    )
    .orderBy('c.id')
    .limit(limit)
    .pluck('c.reference');
}

/** Destroys what the desk keeps of a person beside the complaint: notes, and what the person is known by. */
export async function destroyDeskData(complaintId: number, conn: Connection): Promise<void> {
  await conn('complaint_contacts').where({ complaint_id: complaintId }).delete();
  await conn('complaint_notes')
    .where({ complaint_id: complaintId })
    .update({ ciphertext: Buffer.alloc(0) });
}
