import type { PackItem } from '#lib/contracts/evidencePack';
import { pool, type Connection } from './connection';

/** An answer that is being written, or waits for a second person. */
export interface AnswerRow {
  id: number;
  complaintId: number;
  state: 'draft' | 'submitted';
  /** Counts each keeping. */
  revision: number;
  /** Sealed; only `#lib/services/complaints/answer` opens it. */
  ciphertext: Buffer;
  items: PackItem[];
  templateVersionId: number | null;
  /** Who wrote it last. */
  author: string;
  authorName: string;
  /** Of the figures that were submitted. */
  figuresDigest: string | null;
  submittedAt: Date | null;
  updatedAt: Date;
}

/** The answer to a complaint that has not been sent; undefined where none is being written. */
export async function findOpenAnswer(
  complaintId: number,
  conn: Connection = pool(),
): Promise<AnswerRow | undefined> {
  return conn('complaint_answers as a')
    .join('users as u', 'u.id', 'a.author')
    .where({ 'a.open_complaint_id': complaintId })
    .first({
      id: 'a.id',
      complaintId: 'a.complaint_id',
      state: 'a.state',
      revision: 'a.revision',
      ciphertext: 'a.ciphertext',
      items: 'a.items',
      templateVersionId: 'a.template_version_id',
      author: 'a.author',
      authorName: 'u.name',
      figuresDigest: 'a.figures_digest',
      submittedAt: 'a.submitted_at',
      updatedAt: 'a.updated_at',
    });
}

export interface KeptAnswer {
  complaintId: number;
  ciphertext: Buffer;
  items: readonly PackItem[];
  templateVersionId: number | null;
  author: string;
}

export async function insertAnswer(answer: KeptAnswer, conn: Connection): Promise<void> {
  const now = new Date();
  await conn('complaint_answers').insert({
    complaint_id: answer.complaintId,
    ciphertext: answer.ciphertext,
    items: JSON.stringify(answer.items),
    template_version_id: answer.templateVersionId,
    author: answer.author,
    created_at: now,
    updated_at: now,
  });
}

/** Keeps a draft anew under its next revision. */
export async function rewriteAnswer(id: number, answer: KeptAnswer, conn: Connection): Promise<void> {
  await conn('complaint_answers')
    .where({ id })
    .update({
      ciphertext: answer.ciphertext,
      items: JSON.stringify(answer.items),
      template_version_id: answer.templateVersionId,
      author: answer.author,
      revision: conn.raw('revision + 1'),
      updated_at: new Date(),
    });
}

export async function markSubmitted(id: number, figuresDigest: string, conn: Connection): Promise<void> {
  const now = new Date();
  await conn('complaint_answers')
    .where({ id })
    .update({ state: 'submitted', figures_digest: figuresDigest, submitted_at: now, updated_at: now });
}

/** Gives a submitted answer back to be written on; `decidedBy` null: its author took it back. */
export async function markReturned(id: number, decidedBy: string | null, conn: Connection): Promise<void> {
  const now = new Date();
  await conn('complaint_answers').where({ id }).update({
    state: 'draft',
    figures_digest: null,
    submitted_at: null,
    decided_by: decidedBy,
    decided_at: now,
    updated_at: now,
  });
}

/** Ends an answer: it was sent as a reply, or thrown away. What it said is destroyed; a reply keeps its own. */
export async function endAnswer(
  id: number,
  end: { state: 'sent' | 'withdrawn'; replyId: number | null; decidedBy: string | null },
  conn: Connection,
): Promise<void> {
  const now = new Date();
  await conn('complaint_answers')
    .where({ id })
    .update({
      state: end.state,
      reply_id: end.replyId,
      decided_by: end.decidedBy,
      decided_at: now,
      ciphertext: Buffer.alloc(0),
      updated_at: now,
    });
}

/** An answer that waits for a second person. */
export interface SubmittedAnswer {
  /** Of the complaint. */
  reference: string;
  author: string;
  authorName: string;
  submittedAt: Date;
}

/** Answers of a network that wait for a second person, the oldest first. */
export async function listSubmitted(
  networkId: number,
  conn: Connection = pool(),
): Promise<SubmittedAnswer[]> {
  return conn('complaint_answers as a')
    .join('complaints as c', 'c.id', 'a.complaint_id')
    .join('users as u', 'u.id', 'a.author')
    .where({ 'c.network_id': networkId, 'a.state': 'submitted' })
    .orderBy(['a.submitted_at', 'a.id'])
    .select({
      reference: 'c.reference',
      author: 'a.author',
      authorName: 'u.name',
      submittedAt: 'a.submitted_at',
    });
}
