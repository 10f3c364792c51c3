import {
  findNetworkBySlug,
  listNetworks,
  listSecondFactorNetworks,
  settingsAt,
  type NetworkRow,
  type NetworkSettings,
} from '#db/queries/networks';
import { listMemberships } from '#db/queries/users';
import { notAllowed, notFound } from '#lib/http/problem';
import { factorFirst } from './factorWanted';
import { mayAct, type Role } from './roles';
import type { SignedInUser } from './sessions';

/** A person inside a network. */
export interface NetworkAccess {
  user: SignedInUser;
  network: NetworkRow;
  /** Settings in force now. */
  settings: NetworkSettings;
  roles: Role[];
}

/**
 * Lets a person into a network for what `wanted` roles may do.
 * @throws {Problem} 404 for a network that does not exist or is not theirs (the two look alike), 403 without the role, or from a
 * browser without the second factor that the network asks for.
 */
export async function enterNetwork(
  user: SignedInUser,
  slug: string,
  wanted: readonly Role[],
): Promise<NetworkAccess> {
  const network = await findNetworkBySlug(slug);
  if (!network) throw notFound('There is no such network among yours.');
  const roles = await rolesIn(user, network.id);
  if (!user.isAdministrator && roles.length === 0) throw notFound('There is no such network among yours.');
  if (user.lacksSecondFactor && (await listSecondFactorNetworks()).includes(network.id)) throw factorFirst();
  if (!mayAct(user, roles, wanted)) throw notAllowed();
  return { user, network, settings: await settingsAt(network.id, Math.floor(Date.now() / 1000)), roles };
}

/** Networks that a person may see, with the roles held there. */
export async function networksOf(user: SignedInUser): Promise<{ network: NetworkRow; roles: Role[] }[]> {
  const [networks, memberships] = await Promise.all([listNetworks(), listMemberships(user.id)]);
  return networks
    .map((network) => ({
      network,
      roles: memberships.filter((m) => m.networkId === network.id).map((m) => m.role),
    }))
    .filter(({ roles }) => user.isAdministrator || roles.length > 0);
}

/** The same without networks that are closed until the person has a second factor. */
export async function openNetworksOf(user: SignedInUser): Promise<{ network: NetworkRow; roles: Role[] }[]> {
  const closed = user.lacksSecondFactor ? await listSecondFactorNetworks() : [];
  return (await networksOf(user)).filter(({ network }) => !closed.includes(network.id));
}

async function rolesIn(user: SignedInUser, networkId: number): Promise<Role[]> {
  const memberships = await listMemberships(user.id);
  return memberships.filter((m) => m.networkId === networkId).map((m) => m.role);
}
