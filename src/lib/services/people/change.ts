import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { deleteSessionsOf } from '#db/queries/sessions';
import { lockAdministrators, updateUser } from '#db/queries/users';
import { type PersonChanges } from '#lib/contracts/people';
import { type Person } from './list';
import { setRoles } from './memberships';

/**
 * Refused are `last-administrator`, because nobody could administer afterwards, and `yourself`: who takes their own access
 * away cannot give it back, so somebody else has to do it.
 */
export type PersonChange = 'changed' | 'last-administrator' | 'yourself';

/** Changes a person's name, roles and whether he or she administers. */
export function changePerson(
  person: Person,
  changes: PersonChanges,
  byUserId: string,
): Promise<PersonChange> {
  const { id } = person.user;
  const { name, isAdministrator, roles } = changes;
  return inTransaction(async (transaction) => {
    const refusal = isAdministrator ? null : await whyNot(person, byUserId, transaction);
    if (refusal) return refusal;
    await updateUser(id, { name, isAdministrator }, transaction);
    await setRoles(id, roles, transaction);
    const before = {
      isAdministrator: person.user.isAdministrator,
      roles: person.roles.map(({ network, role }) => ({ network: network.slug, role })),
    };
    const fields = name === person.user.name ? {} : { fieldsChanged: ['name'] };
    const detail = { before, after: { isAdministrator, roles }, ...fields };
    await audit(byUserId, 'person.change', id, detail, transaction);
    return 'changed';
  });
}

/** Ends a person's access now: no sign-in, no token, every session over. */
export function disablePerson(person: Person, byUserId: string): Promise<PersonChange> {
  const { id } = person.user;
  return inTransaction(async (transaction) => {
    const refusal = await whyNot(person, byUserId, transaction);
    if (refusal) return refusal;
    await updateUser(id, { disabledAt: new Date() }, transaction);
    await deleteSessionsOf(id, transaction);
    await audit(byUserId, 'person.disable', id, {}, transaction);
    return 'changed';
  });
}

/** Lets a disabled person sign in again, with the roles held before. */
export function enablePerson(person: Person, byUserId: string): Promise<void> {
  const { id } = person.user;
  return inTransaction(async (transaction) => {
    await updateUser(id, { disabledAt: null }, transaction);
    await audit(byUserId, 'person.enable', id, {}, transaction);
  });
}

/** Why a person may not be taken out of the administrators, or null. */
async function whyNot(
  { user }: Person,
  byUserId: string,
  transaction: Connection,
): Promise<'last-administrator' | 'yourself' | null> {
  const administrators = await lockAdministrators(transaction);
  if (!administrators.includes(user.id)) return null;
  if (administrators.length === 1) return 'last-administrator';
  return user.id === byUserId ? 'yourself' : null;
}

function audit(
  userId: string,
  action: string,
  personId: string,
  detail: Record<string, unknown>,
  transaction: Connection,
): Promise<void> {
  return appendAudit({ userId, networkId: null, action, subject: `person ${personId}`, detail }, transaction);
}
