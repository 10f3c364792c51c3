import { pool, type Connection } from './connection';

/** One thing to tell one recipient, until a message takes it up. */
export interface NewAlertItem {
  networkId: number;
  recipient: string;
  exceedanceId: number;
  /** Names the revision of the exceedance: told once a recipient. */
  key: string;
  words: object;
  dueAt: Date;
}

export interface AlertItemRow {
  id: number;
  exceedanceId: number;
  key: string;
  words: unknown;
}

/** Adds what is not there yet. */
export async function insertAlertItems(
  items: readonly NewAlertItem[],
  now: Date,
  transaction: Connection,
): Promise<void> {
  if (items.length === 0) return;
  await transaction('alert_items')
    .insert(
      items.map(({ networkId, recipient, exceedanceId, key, words, dueAt }) => ({
        network_id: networkId,
        recipient,
        exceedance_id: exceedanceId,
        item_key: key,
        words: JSON.stringify(words),
        due_at: dueAt,
        created_at: now,
      })),
    )
    .onConflict(['recipient', 'item_key'])
    .merge({ item_key: transaction.raw('item_key') });
}

/** Somebody who waits for a message; `name` stands for the address where nothing personal belongs. */
export interface DueRecipient {
  networkId: number;
  recipient: string;
  name: string;
}

const RECIPIENT_NAME = "CONCAT('recipient ', network_id, '/', LEFT(SHA2(LOWER(recipient), 256), 16))";

/** Who waits for a message that is due, the one who waits longest first, but some by their names. */
export async function findDueRecipient(
  now: Date,
  exceptNames: readonly string[] = [],
  conn: Connection = pool(),
): Promise<DueRecipient | undefined> {
  const waiting = conn('alert_items')
    .whereNull('told_at')
    .where('due_at', '<=', now)
    .orderBy(['due_at', 'id'])
    .first('network_id as networkId', 'recipient', conn.raw(`${RECIPIENT_NAME} AS name`));
  if (exceptNames.length === 0) return waiting;
  return waiting.whereRaw(`${RECIPIENT_NAME} NOT IN (${exceptNames.map(() => '?').join(', ')})`, [
    ...exceptNames,
  ]);
}

/** What is due for a recipient and not told, oldest first, locked until the transaction ends. */
export async function lockDueItems(
  { networkId, recipient }: { networkId: number; recipient: string },
  now: Date,
  transaction: Connection,
): Promise<AlertItemRow[]> {
  const rows: AlertItemRow[] = await transaction('alert_items')
    .where({ network_id: networkId, recipient, told_at: null })
    .where('due_at', '<=', now)
    .orderBy('id')
    .forUpdate()
    .select({ id: 'id', exceedanceId: 'exceedance_id', key: 'item_key', words: 'words' });
  return rows.map((row) => ({
    ...row,
    words: typeof row.words === 'string' ? (JSON.parse(row.words) as unknown) : row.words,
  }));
}

export async function markItemsTold(
  ids: readonly number[],
  now: Date,
  transaction: Connection,
): Promise<void> {
  await transaction('alert_items')
    .whereIn('id', [...ids])
    .update({ told_at: now });
}

/** When each recipient of a network was last told anything; who never was is missing. */
export async function lastToldAt(
  networkId: number,
  recipients: readonly string[],
  conn: Connection,
): Promise<Map<string, Date>> {
  const rows: { recipient: string; at: Date }[] = await conn('alert_items')
    .where({ network_id: networkId })
    .whereIn('recipient', [...recipients])
    .whereNotNull('told_at')
    .groupBy('recipient')
    .select('recipient', conn.raw('MAX(told_at) AS at'));
  return new Map(rows.map(({ recipient, at }) => [recipient, at]));
}

/** Removes what was told before an instant. */
export async function deleteItemsToldBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('alert_items').where('told_at', '<', before).delete();
}
