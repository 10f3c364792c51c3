import { pool, type Connection } from './connection';

/** How a network answers. */
export interface AnsweringSettings {
  /** A second person approves an answer before it goes. */
  needsApproval: boolean;
  /** Where residents answer to; `{reference}` in it is filled in. Null: the sender of every message. */
  replyAddress: string | null;
}

const UNTOLD: AnsweringSettings = { needsApproval: false, replyAddress: null };

export async function readAnsweringSettings(
  networkId: number,
  conn: Connection = pool(),
): Promise<AnsweringSettings> {
  const row = await conn('answering_settings')
    .where({ network_id: networkId })
    .first({ needsApproval: 'needs_approval', replyAddress: 'reply_address' });
  return row ? { needsApproval: Boolean(row.needsApproval), replyAddress: row.replyAddress } : UNTOLD;
}

export async function writeAnsweringSettings(
  networkId: number,
  settings: AnsweringSettings,
  userId: string,
  conn: Connection,
): Promise<void> {
  await conn('answering_settings')
    .insert({
      network_id: networkId,
      needs_approval: settings.needsApproval,
      reply_address: settings.replyAddress,
      updated_by: userId,
      updated_at: new Date(),
    })
    .onConflict('network_id')
    .merge();
}
