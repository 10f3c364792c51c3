import { type PersonEntry } from '#lib/contracts/people';

export interface PersonFilter {
  /** Part of the name or the address; empty: any. */
  text: string;
  /** Slug of a network in which a role is held; empty: any. */
  network: string;
  /** `active`, `disabled`, `administrator` or `one-factor` (active, without a second factor); anything else: any. */
  state: string;
}

/** The people that fit, in their order. */
export function filterPeople(
  people: readonly PersonEntry[],
  { text, network, state }: PersonFilter,
): PersonEntry[] {
  const sought = text.toLowerCase();
  return people.filter(
    (person) =>
      `${person.name} ${person.email}`.toLowerCase().includes(sought) &&
      (network === '' || person.roles.some((role) => role.network === network)) &&
      isInState(person, state),
  );
}

function isInState({ isAdministrator, disabledAt, hasSecondFactor }: PersonEntry, state: string): boolean {
  if (state === 'active') return disabledAt === null;
  if (state === 'one-factor') return disabledAt === null && !hasSecondFactor;
  if (state === 'disabled') return disabledAt !== null;
  return state !== 'administrator' || isAdministrator;
}
