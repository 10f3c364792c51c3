import { createHash, randomBytes } from 'node:crypto';
import { pool, type Connection } from './connection';

/** What an address reads, and nothing else: a calendar of due dates, or the exceedances. */
export type FeedPurpose = 'calendar' | 'exceedances';

/** An address by which a person's program reads something of a network. */
export interface CalendarFeedRow {
  id: number;
  createdAt: Date;
  lastUsedAt: Date | null;
}

/** Makes a token for a feed and answers it in the clear, the only time that it can be seen. */
export async function insertCalendarFeed(
  feed: { networkId: number; userId: string; purpose: FeedPurpose },
  conn: Connection,
): Promise<string> {
  const secret = `bc_${randomBytes(32).toString('base64url')}`;
  await conn('calendar_feeds').insert({
    network_id: feed.networkId,
    user_id: feed.userId,
    purpose: feed.purpose,
    digest: digestOf(secret),
    created_at: new Date(),
  });
  return secret;
}

/** A person's feeds of a network and purpose that are in force, newest first. */
export async function listCalendarFeeds(
  { networkId, userId, purpose }: { networkId: number; userId: string; purpose: FeedPurpose },
  conn: Connection = pool(),
): Promise<CalendarFeedRow[]> {
  return conn('calendar_feeds')
    .where({ network_id: networkId, user_id: userId, purpose, revoked_at: null })
    .orderBy('id', 'desc')
    .select({ id: 'id', createdAt: 'created_at', lastUsedAt: 'last_used_at' });
}

/** Person whose feed a token in force names, and the network that it is for; notes its use, at most once a minute. */
export async function findCalendarFeed(
  secret: string,
  purpose: FeedPurpose,
  now: Date,
  conn: Connection = pool(),
): Promise<{ userId: string; networkId: number } | undefined> {
  const row: { id: number; userId: string; networkId: number; lastUsedAt: Date | null } | undefined =
    await conn('calendar_feeds')
      .where({ digest: digestOf(secret), purpose, revoked_at: null })
      .first({ id: 'id', userId: 'user_id', networkId: 'network_id', lastUsedAt: 'last_used_at' });
  if (!row) return undefined;
  if (!row.lastUsedAt || now.getTime() - row.lastUsedAt.getTime() > 60_000) {
    await conn('calendar_feeds').where({ id: row.id }).update({ last_used_at: now });
  }
  return { userId: row.userId, networkId: row.networkId };
}

/** Ends a feed of that person; answers whether there was one to end. */
export async function revokeCalendarFeed(
  { networkId, userId, purpose, id }: { networkId: number; userId: string; purpose: FeedPurpose; id: number },
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('calendar_feeds')
    .where({ id, network_id: networkId, user_id: userId, purpose, revoked_at: null })
    .update({ revoked_at: new Date() });
  return changed > 0;
}

function digestOf(secret: string): Buffer {
  return createHash('sha256').update(secret).digest();
}
