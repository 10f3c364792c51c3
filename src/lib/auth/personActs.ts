import { invalidFields, notFound, Problem } from '#lib/http/problem';
import { type NewPerson, type PersonChanges, type PersonPatch, type RoleGiven } from '#lib/contracts/people';
import { addPerson } from '#lib/services/people/add';
import { changePerson, disablePerson, enablePerson, type PersonChange } from '#lib/services/people/change';
import { findPerson, type Person } from '#lib/services/people/list';
import { unknownNetworks } from '#lib/services/people/memberships';
import { resetPassword } from '#lib/services/people/passwords';
import { endFactor } from '#lib/services/people/secondFactor';
import { hashChosen } from './chosenPassword';
import { makeFirstPassword } from './firstPassword';
import { contextOfNew, passwordContextOf } from './passwordContext';
import { hashPassword } from './passwords';

const REFUSALS: Record<Exclude<PersonChange, 'changed'>, string> = {
  'last-administrator':
    'This is the last administrator who may sign in. Make somebody else administrator first. Nothing was changed.',
  yourself: 'You cannot take away your own access: another administrator has to do it. Nothing was changed.',
};

/** A person by id. @throws {Problem} 404 */
export async function requirePerson(id: string | undefined): Promise<Person> {
  const person = id && (await findPerson(id));
  if (!person) throw notFound('There is no such person.');
  return person;
}

/**
 * Adds a person with the password chosen or, without one, with one made here.
 * @returns the id, and the password where it was made here: told this once.
 * @throws {Problem} 422 with what is wrong by field.
 */
export async function addByAdministrator(
  { password, ...input }: NewPerson,
  byUserId: string,
): Promise<{ id: string; password: string | null }> {
  await requireNetworks(input.roles);
  const made = password ? null : makeFirstPassword();
  const hash = password
    ? await hashChosen(password, await contextOfNew(input), 'password')
    : await hashPassword(made ?? '');
  const adding = await addPerson(input, hash, byUserId);
  if (adding.outcome === 'added') return { id: adding.id, password: made };
  throw invalidFields([
    { field: 'email', message: 'belongs to somebody already; disabled people count, too' },
  ]);
}

/** Changes name, roles and administration at once. @throws {Problem} 409, 422 */
export async function changeByAdministrator(
  person: Person,
  changes: PersonChanges,
  byUserId: string,
): Promise<void> {
  await requireNetworks(changes.roles);
  requireChanged(await changePerson(person, changes, byUserId));
}

/** Ends a person's access, or gives it back. @throws {Problem} 409 */
export async function setDisabled(person: Person, isDisabled: boolean, byUserId: string): Promise<void> {
  if (isDisabled === (person.user.disabledAt !== null)) return;
  if (isDisabled) requireChanged(await disablePerson(person, byUserId));
  else await enablePerson(person, byUserId);
}

/** As the interface asks it: what is left out stays. @throws {Problem} 409, 422 */
export async function patchByAdministrator(
  person: Person,
  { disabled, ...given }: PersonPatch,
  byUserId: string,
): Promise<void> {
  if (disabled !== undefined) return setDisabled(person, disabled, byUserId);
  const { name, isAdministrator } = person.user;
  await changeByAdministrator(
    person,
    { name, isAdministrator, roles: rolesGiven(person), ...given },
    byUserId,
  );
}

/**
 * Gives a person the password chosen or, without one, one made here, and ends every session of theirs.
 * @returns the password where it was made here: told this once.
 * @throws {Problem} 409 for one's own: that is changed knowing the current one.
 */
export async function resetByAdministrator(
  person: Person,
  chosen: string | undefined,
  byUserId: string,
): Promise<string | null> {
  if (person.user.id === byUserId) {
    throw refused('yourself', 'Your own password is changed on your own page, with the current one.');
  }
  const made = chosen ? null : makeFirstPassword();
  const hash = chosen
    ? await hashChosen(chosen, await passwordContextOf(person.user), 'password')
    : await hashPassword(made ?? '');
  await resetPassword(person.user.id, hash, byUserId);
  return made;
}

/** Roles of a person by the networks' slugs. */
export function rolesGiven({ roles }: Person): RoleGiven[] {
  return roles.map(({ network, role }) => ({ network: network.slug, role }));
}

/** Takes a person's second factor away, for who lost the authenticator and the codes. @throws {Problem} 404, 409 */
export async function resetFactor(person: Person, byUserId: string): Promise<void> {
  if (person.user.id === byUserId) {
    throw refused('yourself', 'Your own second factor is changed on your own page. Nothing was changed.');
  }
  if (!(await endFactor(person.user, byUserId))) throw notFound('There is no second factor to take away.');
}

/** Refuses roles that name no network. @throws {Problem} 422 */
export async function requireNetworks(roles: readonly RoleGiven[]): Promise<void> {
  const unknown = await unknownNetworks(roles);
  if (unknown.length > 0) {
    throw invalidFields([{ field: 'roles', message: `name no network: ${unknown.join(', ')}` }]);
  }
}

function requireChanged(outcome: PersonChange): void {
  if (outcome !== 'changed') throw refused(outcome, REFUSALS[outcome]);
}

const refused = (code: string, detail: string) => new Problem(409, code, 'Not possible', detail);
