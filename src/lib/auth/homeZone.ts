import { settingsAt } from '#db/queries/networks';
import { networksOf } from './networkAccess';
import type { SignedInUser } from './sessions';

/** The zone in which a page outside networks tells times: that of the person's first network, UTC without one. */
export async function homeZone(user: SignedInUser): Promise<string> {
  const [first] = await networksOf(user);
  if (!first) return 'UTC';
  return (await settingsAt(first.network.id, Math.floor(Date.now() / 1000))).timeZone;
}
