import { randomUUID } from 'node:crypto';
import { config } from '#lib/config/index';
import type { PackItem } from '#lib/contracts/evidencePack';
import type { Evidence } from '#lib/contracts/complaintEvidence';
import { pool, type Connection } from './connection';

export interface ReplyRow {
  id: number;
  createdAt: Date;
  /** Name of the person who sent it. */
  sentBy: string;
  figures: Evidence;
  /** State of its e-mail; null: a letter to print and post. */
  mailState: 'waiting' | 'sent' | 'dead' | null;
  mailAttempts: number | null;
  mailSentAt: Date | null;
  /** Why the last attempt failed, without an address; null: it did not. */
  mailError: string | null;
  messageId: string | null;
  /** Name of the second person, where one approved it. */
  approvedBy: string | null;
  /** Of a letter on paper, once posted. */
  postedOn: string | null;
  postedBy: string | null;
  /** Items of the evidence that went with it; null: sent before there was a choice. */
  items: PackItem[] | null;
  hasPdf: boolean;
}

export interface NewReplyRow {
  complaintId: number;
  ciphertext: Buffer;
  figures: Evidence;
  items: readonly PackItem[];
  sentBy: string;
  approvedBy: string | null;
  at: Date;
}

export async function insertReply(reply: NewReplyRow, conn: Connection): Promise<number> {
  const [id] = await conn('complaint_replies').insert({
    complaint_id: reply.complaintId,
    ciphertext: reply.ciphertext,
    figures: JSON.stringify(reply.figures),
    items: JSON.stringify(reply.items),
    sent_by: reply.sentBy,
    approved_by: reply.approvedBy,
    created_at: reply.at,
  });
  return Number(id);
}

export async function countReplies(complaintId: number, conn: Connection = pool()): Promise<number> {
  const row = await conn('complaint_replies')
    .where({ complaint_id: complaintId })
    .count({ count: '*' })
    .first();
  return Number(row?.count ?? 0);
}

/** Replies of a complaint, oldest first. */
export async function listReplies(complaintId: number, conn: Connection = pool()): Promise<ReplyRow[]> {
  const rows = await conn('complaint_replies as r')
    .join('users as u', 'u.id', 'r.sent_by')
    .leftJoin('users as a', 'a.id', 'r.approved_by')
    .leftJoin('users as p', 'p.id', 'r.posted_by')
    .leftJoin('outbox as o', 'o.dedupe_key', conn.raw(`CONCAT('complaint-reply:', r.id)`))
    .leftJoin('complaint_letters as l', 'l.reply_id', 'r.id')
    .where({ 'r.complaint_id': complaintId })
    .orderBy('r.id')
    .select({
      id: 'r.id',
      createdAt: 'r.created_at',
      sentBy: 'u.name',
      figures: 'r.figures',
      mailState: 'o.state',
      mailAttempts: 'o.attempts',
      mailSentAt: 'o.sent_at',
      mailError: 'o.last_error',
      messageId: 'o.message_id',
      approvedBy: 'a.name',
      postedOn: conn.raw(`DATE_FORMAT(r.posted_on, '%Y-%m-%d')`),
      postedBy: 'p.name',
      items: 'r.items',
      letterOf: 'l.reply_id',
    });
  return rows.map(({ letterOf, ...row }) => ({ ...row, hasPdf: letterOf !== null }));
}

/** Notes that a letter on paper was posted; false when it was before, or is an e-mail. */
export async function markPosted(
  complaintId: number,
  replyId: number,
  posted: { by: string; on: string } | null,
  conn: Connection,
): Promise<boolean> {
  const query = conn('complaint_replies').where({ id: replyId, complaint_id: complaintId });
  const changed = posted
    ? await query.whereNull('posted_on').update({ posted_by: posted.by, posted_on: posted.on })
    : await query.whereNotNull('posted_on').update({ posted_by: null, posted_on: null });
  return changed === 1;
}

/** Number in the outbox of a reply's e-mail; undefined for a letter on paper. */
export async function findReplyMail(
  complaintId: number,
  replyId: number,
  conn: Connection = pool(),
): Promise<number | undefined> {
  const row = await conn('outbox as o')
    .join('complaint_replies as r', 'r.id', 'o.complaint_reply_id')
    .where({ 'r.id': replyId, 'r.complaint_id': complaintId })
    .first({ id: 'o.id' });
  return row && Number(row.id);
}

export interface SealedReply {
  id: number;
  complaintId: number;
  wrappedKey: Buffer;
  ciphertext: Buffer;
}

/** Undefined for a reply that is not there, or whose personal data have been erased. */
export async function findSealedReply(
  replyId: number,
  conn: Connection = pool(),
): Promise<SealedReply | undefined> {
  return selectSealed(conn).where({ 'r.id': replyId }).first();
}

/** Sealed replies of a complaint; none once its personal data have been erased. */
export async function listSealedReplies(
  complaintId: number,
  conn: Connection = pool(),
): Promise<SealedReply[]> {
  return selectSealed(conn).where({ 'r.complaint_id': complaintId }).orderBy('r.id');
}

function selectSealed(conn: Connection) {
  return conn('complaint_replies as r')
    .join('complaint_keys as k', 'k.complaint_id', 'r.complaint_id')
    .select({
      id: 'r.id',
      complaintId: 'r.complaint_id',
      wrappedKey: 'k.wrapped_key',
      ciphertext: 'r.ciphertext',
    });
}

/** Gives up e-mails of a complaint's replies that have not gone yet: whom they were for is being erased. */
export async function giveUpReplyMails(complaintId: number, conn: Connection): Promise<void> {
  await conn('outbox')
    .where({ state: 'waiting' })
    .whereIn(
      'complaint_reply_id',
      conn('complaint_replies').where({ complaint_id: complaintId }).select('id'),
    )
    .update({ state: 'dead', last_error: 'The personal data were erased before it was sent.' });
}

/**
 * Puts a reply's e-mail into the outbox, in the transaction of the reply. Recipient and body stay away: the sender resolves
 * them from the reply. The Message-ID is the same at every attempt and holds the reference, so that an answer to it names it.
 */
export async function queueReplyMail(
  mail: { replyId: number; networkId: number; reference: string; subject: string; at: Date },
  conn: Connection,
): Promise<void> {
  await conn('outbox').insert({
    message_id: `<${mail.reference}.${mail.replyId}.${randomUUID()}@${new URL(config().origin).hostname}>`,
    dedupe_key: `complaint-reply:${mail.replyId}`,
    network_id: mail.networkId,
    kind: 'complaint-reply',
    recipient: null,
    subject: mail.subject,
    complaint_reply_id: mail.replyId,
    next_attempt_at: mail.at,
    created_at: mail.at,
  });
}
