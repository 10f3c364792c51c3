import { randomUUID } from 'node:crypto';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertUser } from '#db/queries/users';
import { type NewPerson } from '#lib/contracts/people';
import { isDuplicateKey } from '../duplicateKey';
import { setRoles } from './memberships';

export type PersonAdding = { outcome: 'added'; id: string } | { outcome: 'email-taken' };

/** Adds a person with roles and a password that is handed over, to be changed at the first sign-in. The audit entry names the person by id: names and addresses are personal. */
export async function addPerson(
  input: NewPerson,
  passwordHash: string,
  byUserId: string,
): Promise<PersonAdding> {
  const { name, email, isAdministrator, roles } = input;
  const id = randomUUID();
  try {
    await inTransaction(async (transaction) => {
      const person = { id, email, name, passwordHash, isAdministrator, mustChangePassword: true };
      await insertUser(person, transaction);
      await setRoles(id, roles, transaction);
      await appendAudit(
        {
          userId: byUserId,
          networkId: null,
          action: 'person.add',
          subject: `person ${id}`,
          detail: { isAdministrator, roles },
        },
        transaction,
      );
    });
    return { outcome: 'added', id };
  } catch (error) {
    if (isDuplicateKey(error)) return { outcome: 'email-taken' };
    throw error;
  }
}
