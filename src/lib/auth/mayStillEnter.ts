import type { APIContext } from 'astro';
import { Problem } from '#lib/http/problem';
import { enterNetwork } from './networkAccess';
import { userOfRequest } from './requestUser';
import type { Role } from './roles';

/**
 * Whether the session or token that a long answer began with still opens the network: neither signed out, nor expired, nor
 * without the role since.
 */
export async function mayStillEnter(
  context: Pick<APIContext, 'request' | 'cookies'>,
  slug: string,
  roles: readonly Role[],
): Promise<boolean> {
  const user = await userOfRequest(context);
  if (!user) return false;
  try {
    await enterNetwork(user, slug, roles);
    return true;
  } catch (error) {
    if (error instanceof Problem) return false;
    throw error;
  }
}
