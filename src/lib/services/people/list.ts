import { listNetworks, type NetworkRow } from '#db/queries/networks';
import { hasSecondFactor, listSecondFactorUsers } from '#db/queries/secondFactors';
import { findUserById, listAllMemberships, listMemberships, listUsers, type Role } from '#db/queries/users';
import { type UserRow } from '#db/queries/users';

/** A person with the roles held in each network. */
export interface Person {
  user: UserRow;
  roles: { network: NetworkRow; role: Role }[];
  hasSecondFactor: boolean;
}

/** Everybody by name, disabled people too. */
export async function listPeople(): Promise<Person[]> {
  const [users, withFactor, networks, memberships] = await Promise.all([
    listUsers(),
    listSecondFactorUsers(),
    listNetworks(),
    listAllMemberships(),
  ]);
  return users.map((user) => ({
    user,
    hasSecondFactor: withFactor.includes(user.id),
    roles: rolesOf(
      memberships.filter((membership) => membership.userId === user.id),
      networks,
    ),
  }));
}

export async function findPerson(id: string): Promise<Person | undefined> {
  const [user, hasFactor, networks, memberships] = await Promise.all([
    findUserById(id),
    hasSecondFactor(id),
    listNetworks(),
    listMemberships(id),
  ]);
  return user && { user, roles: rolesOf(memberships, networks), hasSecondFactor: hasFactor };
}

function rolesOf(memberships: { networkId: number; role: Role }[], networks: NetworkRow[]): Person['roles'] {
  return networks.flatMap((network) =>
    memberships.filter(({ networkId }) => networkId === network.id).map(({ role }) => ({ network, role })),
  );
}
