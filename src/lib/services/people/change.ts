import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { deleteSessionsOf } from '#db/queries/sessions';
import { lockAdministrators, updateUser } from '#db/queries/users';
import { type PersonChanges } from '#lib/contracts/people';
import { type Person } from './list';
import { setRoles } from './memberships';

/** `last-administrator`: refused, because nobody could administer afterwards. */
export type PersonChange = 'changed' | 'last-administrator';

/** Changes a person's name, roles and whether he or she administers. */
export function changePerson(
  person: Person,
  changes: PersonChanges,
  byUserId: string,
): Promise<PersonChange> {
  const { id } = person.user;
  const { name, isAdministrator, roles } = changes;
  return inTransaction(async (transaction) => {
    if (!isAdministrator && (await isLastAdministrator(id, transaction))) return 'last-administrator';
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
    if (await isLastAdministrator(id, transaction)) return 'last-administrator';
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

async function isLastAdministrator(id: string, transaction: Connection): Promise<boolean> {
  const administrators = await lockAdministrators(transaction);
  return administrators.length === 1 && administrators[0] === id;
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
