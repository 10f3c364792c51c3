import { appendAudit } from '#db/queries/audit';
import {
  insertCalendarFeed,
  listCalendarFeeds,
  revokeCalendarFeed,
  type FeedPurpose,
} from '#db/queries/calendarFeeds';
import { inTransaction } from '#db/queries/connection';

interface Owner {
  networkId: number;
  userId: string;
}

/** A person's feeds of a network and purpose that are in force, newest first. */
export const feedsOf = (owner: Owner, purpose: FeedPurpose) => listCalendarFeeds({ ...owner, purpose });

/** Makes a feed's token, told this once. */
export function makeFeed(owner: Owner, purpose: FeedPurpose): Promise<string> {
  return inTransaction(async (transaction) => {
    const token = await insertCalendarFeed({ ...owner, purpose }, transaction);
    await note(owner, `${auditNoun(purpose)}.make`, {}, transaction);
    return token;
  });
}

/** Ends a feed at once; answers whether there was one to end. */
export function endFeed(owner: Owner, purpose: FeedPurpose, id: number): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const isEnded = await revokeCalendarFeed({ ...owner, purpose, id }, transaction);
    if (isEnded) await note(owner, `${auditNoun(purpose)}.revoke`, { feed: id }, transaction);
    return isEnded;
  });
}

const auditNoun = (purpose: FeedPurpose) => (purpose === 'calendar' ? 'calendar-feed' : 'exceedance-feed');

function note(
  { networkId, userId }: Owner,
  action: string,
  detail: Record<string, unknown>,
  transaction: Parameters<typeof appendAudit>[1],
): Promise<void> {
  return appendAudit({ userId, networkId, action, subject: `person ${userId}`, detail }, transaction);
}
