import { appendAudit } from '#db/queries/audit';
import { insertCalendarFeed, listCalendarFeeds, revokeCalendarFeed } from '#db/queries/calendarFeeds';
import { inTransaction } from '#db/queries/connection';

interface Owner {
  networkId: number;
  userId: string;
}

/** A person's calendar feeds of a network that are in force, newest first. */
export const calendarFeeds = (owner: Owner) => listCalendarFeeds(owner);

/** Makes a calendar feed's token, told this once. */
export function makeCalendarFeed(owner: Owner): Promise<string> {
  return inTransaction(async (transaction) => {
    const token = await insertCalendarFeed(owner, transaction);
    await note(owner, 'calendar-feed.make', {}, transaction);
    return token;
  });
}

/** Ends a feed at once; answers whether there was one to end. */
export function endCalendarFeed(owner: Owner, id: number): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const isEnded = await revokeCalendarFeed({ ...owner, id }, transaction);
    if (isEnded) await note(owner, 'calendar-feed.revoke', { feed: id }, transaction);
    return isEnded;
  });
}

function note(
  { networkId, userId }: Owner,
  action: string,
  detail: Record<string, unknown>,
  transaction: Parameters<typeof appendAudit>[1],
): Promise<void> {
  return appendAudit({ userId, networkId, action, subject: `person ${userId}`, detail }, transaction);
}
