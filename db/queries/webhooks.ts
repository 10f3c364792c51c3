import { pool, type Connection } from './connection';

/** Where a network's events are posted. */
export interface WebhookRow {
  id: number;
  networkId: number;
  url: string;
  /** The secret is derived from it. */
  salt: Buffer;
  createdAt: Date;
  createdByName: string | null;
  failures: number;
  failingSince: Date | null;
  nextAttemptAt: Date;
  disabledAt: Date | null;
  disabledReason: string | null;
}

/** Webhooks of a network that were not ended, oldest first. */
export async function listWebhooks(networkId: number, conn: Connection = pool()): Promise<WebhookRow[]> {
  return selectWebhooks(conn).where({ 'w.network_id': networkId, 'w.ended_at': null }).orderBy('w.id');
}

export async function findWebhook(id: number, conn: Connection = pool()): Promise<WebhookRow | undefined> {
  return selectWebhooks(conn).where({ 'w.id': id, 'w.ended_at': null }).first();
}

/** The webhook, locked until the transaction ends. */
export async function lockWebhook(id: number, transaction: Connection): Promise<WebhookRow | undefined> {
  await transaction('webhooks').where({ id }).forUpdate().first('id');
  return findWebhook(id, transaction);
}

export async function insertWebhook(
  webhook: { networkId: number; url: string; salt: Buffer; createdBy: string },
  transaction: Connection,
): Promise<number> {
  const now = new Date();
  const [id] = await transaction('webhooks').insert({
    network_id: webhook.networkId,
    url: webhook.url,
    salt: webhook.salt,
    created_by: webhook.createdBy,
    created_at: now,
    next_attempt_at: now,
  });
  return Number(id);
}

/** Ends a webhook for good. */
export async function endWebhook(id: number, transaction: Connection): Promise<void> {
  await transaction('webhooks').where({ id }).update({ ended_at: new Date() });
}

/** What becomes of a webhook with an attempt, or when a person has it tried again. */
export interface WebhookHealth {
  failures: number;
  failingSince: Date | null;
  nextAttemptAt: Date;
  disabledAt: Date | null;
  disabledReason: string | null;
}

export async function updateWebhookHealth(
  id: number,
  health: WebhookHealth,
  transaction: Connection,
): Promise<void> {
  await transaction('webhooks').where({ id }).update({
    failures: health.failures,
    failing_since: health.failingSince,
    next_attempt_at: health.nextAttemptAt,
    disabled_at: health.disabledAt,
    disabled_reason: health.disabledReason,
  });
}

function selectWebhooks(conn: Connection) {
  return conn('webhooks as w').leftJoin('users as u', 'u.id', 'w.created_by').select({
    id: 'w.id',
    networkId: 'w.network_id',
    url: 'w.url',
    salt: 'w.salt',
    createdAt: 'w.created_at',
    createdByName: 'u.name',
    failures: 'w.failures',
    failingSince: 'w.failing_since',
    nextAttemptAt: 'w.next_attempt_at',
    disabledAt: 'w.disabled_at',
    disabledReason: 'w.disabled_reason',
  });
}
