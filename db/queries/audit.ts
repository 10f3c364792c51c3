import { createHash } from 'node:crypto';
import { originAddress } from './auditOrigin';
import { pool, type Connection } from './connection';

/** One act worth remembering. For personal tables `detail` names fields, never values. */
export interface AuditEntry {
  userId: string | null;
  networkId: number | null;
  /** What was done, as noun.verb: `station.register`. */
  action: string;
  /** What it was done to: `station MER-04`. */
  subject: string;
  detail: Record<string, unknown>;
}

interface ChainedEntry extends AuditEntry {
  id: number;
  atIso: string;
  /** Where a signed-in person acted from. */
  fromAddress: string | null;
}

/**
 * Appends to the audit chain: each row's digest covers the digest before it, so a changed, removed or inserted row
 * breaks every later one. Call it in the transaction of the act itself, last: the head row is locked until commit.
 */
export async function appendAudit(entry: AuditEntry, transaction: Connection): Promise<void> {
  const head = await transaction('audit_head')
    .where({ only_row: 1 })
    .forUpdate()
    .first('last_id', 'last_digest');
  const at = new Date();
  const id = Number(head.last_id) + 1;
  // Bittern itself has no address, and a resident's is not to be kept.
  const fromAddress = entry.userId === null ? null : originAddress();
  const digest = auditDigest(head.last_digest, { ...entry, id, atIso: at.toISOString(), fromAddress });
  await transaction('audit_log').insert({
    id,
    at,
    user_id: entry.userId,
    from_address: fromAddress,
    network_id: entry.networkId,
    action: entry.action,
    subject: entry.subject,
    detail: JSON.stringify(entry.detail),
    previous_digest: head.last_digest,
    digest,
  });
  await transaction('audit_head').where({ only_row: 1 }).update({ last_id: id, last_digest: digest });
}

/** First row whose digest or predecessor does not fit, or null when the whole chain holds. */
export async function findAuditBreak(conn: Connection = pool()): Promise<number | null> {
  let previous: Buffer = Buffer.alloc(32);
  let expectedId = 1;
  const rows = conn('audit_log').orderBy('id').select('*').stream() as AsyncIterable<AuditRow>;
  for await (const row of rows) {
    const digest = auditDigest(previous, entryOf(row));
    const fits =
      Number(row.id) === expectedId && previous.equals(row.previous_digest) && digest.equals(row.digest);
    if (!fits) return Number(row.id);
    previous = digest;
    expectedId += 1;
  }
  const head = await conn('audit_head').where({ only_row: 1 }).first('last_digest');
  return previous.equals(head.last_digest) ? null : expectedId;
}

/** The digest of the act at a place of the chain, in hexadecimal; null where there is none. Place 0 is the beginning, before any act. */
export async function auditDigestAt(position: number, conn: Connection = pool()): Promise<string | null> {
  if (position === 0) return Buffer.alloc(32).toString('hex');
  const row: { digest: Buffer } | undefined = await conn('audit_log').where({ id: position }).first('digest');
  return row?.digest.toString('hex') ?? null;
}

interface AuditRow {
  id: number;
  at: Date;
  user_id: string | null;
  from_address: string | null;
  network_id: number | null;
  action: string;
  subject: string;
  detail: string;
  previous_digest: Buffer;
  digest: Buffer;
}

function entryOf(row: AuditRow): ChainedEntry {
  return {
    id: Number(row.id),
    atIso: row.at.toISOString(),
    userId: row.user_id,
    fromAddress: row.from_address,
    networkId: row.network_id,
    action: row.action,
    subject: row.subject,
    detail: typeof row.detail === 'string' ? JSON.parse(row.detail) : row.detail,
  };
}

function auditDigest(previous: Buffer, entry: ChainedEntry): Buffer {
  const { id, atIso, userId, networkId, action, subject, detail, fromAddress } = entry;
  // Acts from before addresses were noted have digests without one.
  const from = fromAddress === null ? [] : [fromAddress];
  const text = JSON.stringify([id, atIso, userId, networkId, action, subject, detail, ...from]);
  return createHash('sha256').update(previous).update(text).digest();
}
