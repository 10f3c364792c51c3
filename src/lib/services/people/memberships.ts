import { type Connection } from '#db/queries/connection';
import { listNetworks } from '#db/queries/networks';
import { deleteMembership, insertMembership, listMemberships, type Membership } from '#db/queries/users';
import { type RoleGiven } from '#lib/contracts/people';

/** Slugs among the roles that name no network. */
export async function unknownNetworks(roles: readonly RoleGiven[]): Promise<string[]> {
  const known = new Set((await listNetworks()).map(({ slug }) => slug));
  return [...new Set(roles.map(({ network }) => network))].filter((slug) => !known.has(slug));
}

/** Makes a person's roles exactly these. A network that does not exist gives nothing. */
export async function setRoles(
  userId: string,
  wanted: readonly RoleGiven[],
  transaction: Connection,
): Promise<void> {
  const networks = await listNetworks(transaction);
  const held = await listMemberships(userId, transaction);
  const memberships = wanted.flatMap(({ network, role }) =>
    networks.filter(({ slug }) => slug === network).map(({ id }) => ({ userId, networkId: id, role })),
  );
  for (const one of without(memberships, held)) await insertMembership(one, transaction);
  for (const one of without(held, memberships)) await deleteMembership(one, transaction);
}

/** Memberships of the first list, each once, that the second lacks. */
function without(these: readonly Membership[], those: readonly Membership[]): Membership[] {
  const key = ({ networkId, role }: Membership) => `${networkId} ${role}`;
  const others = new Set(those.map(key));
  return [...new Map(these.map((one) => [key(one), one])).values()].filter((one) => !others.has(key(one)));
}
