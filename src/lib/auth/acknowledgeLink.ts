import { findNetworkOfExceedance } from '#db/queries/exceedancePlaces';
import { findNetworkById } from '#db/queries/networks';
import { findUserById } from '#db/queries/users';
import { notAllowed, notFound, Problem } from '#lib/http/problem';
import { LINK_DAYS, readLink } from '#lib/services/alerts/acknowledgeLink';
import { enterNetwork, type NetworkAccess } from './networkAccess';

const NO_LINK = 'This is not an address that Bittern wrote in an e-mail, or it was cut off on the way.';
const NO_ROLE = 'The person to whom this link was sent may not acknowledge exceedances here any more.';

/**
 * Lets the holder of a link from an e-mail in as the person it was written to, for acknowledging that one exceedance and nothing
 * else. Whether the person may do that is judged now, not when it was written.
 * @throws {Problem} 404 for what is no link of ours, 410 for one that has run out, 403 where the person may not any more.
 */
export async function requireAcknowledgeLink(
  token: string | undefined,
  nowSec: number,
): Promise<NetworkAccess & { exceedanceId: number }> {
  const claim = readLink(token ?? '');
  const networkId = claim && (await findNetworkOfExceedance(claim.exceedanceId));
  const network = networkId && (await findNetworkById(networkId));
  if (!claim || !network) throw notFound(NO_LINK);
  if (nowSec >= claim.untilSec) {
    throw new Problem(
      410,
      'link-over',
      'The link has run out',
      `It held for ${LINK_DAYS} days. Sign in instead.`,
    );
  }
  const person = await findUserById(claim.userId);
  if (!person || person.disabledAt) throw notAllowed(NO_ROLE);
  const access = await enterNetwork(person, network.slug, ['operator']).catch((error: unknown) => {
    throw error instanceof Problem ? notAllowed(NO_ROLE) : error;
  });
  return { ...access, exceedanceId: claim.exceedanceId };
}
