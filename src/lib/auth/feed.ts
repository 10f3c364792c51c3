import { findCalendarFeed, type FeedPurpose } from '#db/queries/calendarFeeds';
import { findNetworkBySlug } from '#db/queries/networks';
import { findUserById } from '#db/queries/users';
import { notFound, signInFirst } from '#lib/http/problem';
import { enterNetwork, type NetworkAccess } from './networkAccess';
import { ALL_ROLES } from './roles';

const NO_FEED = 'There is no feed under this address, or it has been ended.';

/**
 * Lets a program in by the token in a feed's address, for what the person who made it may still read, and nothing else.
 * @throws {Problem} 401 without a token, 404 for one that is not in force, or of another network or purpose.
 */
export async function requireFeed(
  url: URL,
  slug: string | undefined,
  purpose: FeedPurpose,
): Promise<NetworkAccess> {
  const token = url.searchParams.get('token');
  if (token === null) throw signInFirst();
  const feed = await findCalendarFeed(token, purpose, new Date());
  const network = feed && (await findNetworkBySlug(slug ?? ''));
  const person = feed && (await findUserById(feed.userId));
  if (!feed || !network || network.id !== feed.networkId || !person || person.disabledAt) {
    throw notFound(NO_FEED);
  }
  return enterNetwork(person, network.slug, ALL_ROLES);
}
