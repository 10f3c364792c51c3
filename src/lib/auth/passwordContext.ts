import { listNetworks } from '#db/queries/networks';
import { listMemberships } from '#db/queries/users';
import { type PasswordContext } from '#lib/services/people/passwordRules';

/** Whose a new password will be: an administrator belongs to every network. */
export async function passwordContextOf(person: {
  id: string;
  email: string;
  name: string;
  isAdministrator: boolean;
}): Promise<PasswordContext> {
  const [networks, memberships] = await Promise.all([listNetworks(), listMemberships(person.id)]);
  const theirs = networks.filter(
    ({ id }) => person.isAdministrator || memberships.some(({ networkId }) => networkId === id),
  );
  return contextOf(person, theirs);
}

/** The same of somebody who is to be a person, with the slugs of the networks. */
export async function contextOfNew(person: {
  email: string;
  name: string;
  isAdministrator: boolean;
  roles: readonly { network: string }[];
}): Promise<PasswordContext> {
  const networks = await listNetworks();
  const theirs = networks.filter(
    ({ slug }) => person.isAdministrator || person.roles.some(({ network }) => network === slug),
  );
  return contextOf(person, theirs);
}

function contextOf(
  { email, name }: { email: string; name: string },
  networks: readonly { slug: string; name: string }[],
): PasswordContext {
  return { email, name, networks: networks.flatMap((network) => [network.name, network.slug]) };
}
