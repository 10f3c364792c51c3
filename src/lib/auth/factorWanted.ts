import { listSecondFactorNetworks } from '#db/queries/networks';
import { listMemberships } from '#db/queries/users';
import { Problem } from '#lib/http/problem';

export const FACTOR_FIRST = 'second-factor-first';

/** The refusal of somebody signed in without the second factor that is asked for. */
export const factorFirst = () =>
  new Problem(
    403,
    FACTOR_FIRST,
    'Set up a second factor first',
    'A second factor is required here, and your account has none yet: set one up under “Your account”, then come back.',
  );

/** Networks of a person that ask for a second factor: of an administrator, all that do. */
export async function networksWantingFactor(person: {
  id: string;
  isAdministrator: boolean;
}): Promise<number[]> {
  const wanting = await listSecondFactorNetworks();
  if (wanting.length === 0 || person.isAdministrator) return wanting;
  const memberships = await listMemberships(person.id);
  return wanting.filter((id) => memberships.some(({ networkId }) => networkId === id));
}
