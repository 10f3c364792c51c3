import type { Knex } from 'knex';
import { pool, type Connection } from './connection';

/** An act as the trail shows it. */
export interface AuditRecord {
  id: number;
  at: Date;
  userId: string | null;
  /** Where a signed-in person acted from; null: not in a request of one. */
  fromAddress: string | null;
  networkId: number | null;
  action: string;
  subject: string;
  detail: Record<string, unknown>;
}

/** Which acts are asked for; what is left out does not matter. */
export interface AuditFilter {
  userId?: string | undefined;
  networkId?: number | undefined;
  action?: string | undefined;
  subject?: string | undefined;
  /** Stands in what it was done to, in its details, or is the address it was done from. */
  text?: string | undefined;
  /** Half-open: `fromAt <= at < toAt`. */
  fromAt?: Date | undefined;
  toAt?: Date | undefined;
  /** Only acts before this one. */
  beforeId?: number | undefined;
}

/** Acts that fit, newest first, at most `limit`. */
export async function listAudit(
  { userId, networkId, action, subject, text, fromAt, toAt, beforeId }: AuditFilter,
  limit: number,
  conn: Connection = pool(),
): Promise<AuditRecord[]> {
  const query = conn('audit_log').orderBy('id', 'desc').limit(limit);
  if (userId !== undefined) void query.where({ user_id: userId });
  if (networkId !== undefined) void query.where({ network_id: networkId });
  if (action !== undefined) void query.where({ action });
  if (subject !== undefined) void query.where({ subject });
  if (text !== undefined) void query.where((either) => holdsText(either, text));
  if (fromAt !== undefined) void query.where('at', '>=', fromAt);
  if (toAt !== undefined) void query.where('at', '<', toAt);
  if (beforeId !== undefined) void query.where('id', '<', beforeId);
  const rows: AuditLogRow[] = await query.select({
    id: 'id',
    at: 'at',
    userId: 'user_id',
    fromAddress: 'from_address',
    networkId: 'network_id',
    action: 'action',
    subject: 'subject',
    detail: 'detail',
  });
  return rows.map((row) => ({ ...row, id: Number(row.id), detail: detailOf(row.detail) }));
}

function holdsText(query: Knex.QueryBuilder, text: string): void {
  const pattern = `%${text.replace(/[\\%_]/g, '\\$&')}%`;
  void query
    .where('subject', 'like', pattern)
    .orWhereRaw('detail COLLATE utf8mb4_uca1400_ai_ci LIKE ?', [pattern])
    .orWhere('from_address', text);
}

/** Every kind of act that has happened, by name. */
export async function listAuditActions(conn: Connection = pool()): Promise<string[]> {
  return conn('audit_log').distinct('action').orderBy('action').pluck('action');
}

/** How many acts the chain holds. */
export async function countAudit(conn: Connection = pool()): Promise<number> {
  const head = await conn('audit_head').where({ only_row: 1 }).first('last_id');
  return Number(head.last_id);
}

/** Head of the chain: how many acts it holds, and the digest of the last. */
export async function auditHead(conn: Connection = pool()): Promise<{ position: number; sha256: string }> {
  const head = await conn('audit_head').where({ only_row: 1 }).first('last_id', 'last_digest');
  return { position: Number(head.last_id), sha256: (head.last_digest as Buffer).toString('hex') };
}

type AuditLogRow = Omit<AuditRecord, 'id' | 'detail'> & { id: number | string; detail: unknown };

/** The driver answers JSON columns as text or parsed, as the server tells their type. */
function detailOf(detail: unknown): Record<string, unknown> {
  return (typeof detail === 'string' ? JSON.parse(detail) : detail) as Record<string, unknown>;
}
