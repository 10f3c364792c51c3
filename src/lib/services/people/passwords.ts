import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { deleteOtherSessions, deleteSessionsOf } from '#db/queries/sessions';
import { updateUser } from '#db/queries/users';

/** Stores a person's own new password and ends the sessions elsewhere. */
export function changeOwnPassword(
  userId: string,
  passwordHash: string,
  keptSessionId: string,
): Promise<void> {
  return inTransaction(async (transaction) => {
    await updateUser(userId, { passwordHash }, transaction);
    await deleteOtherSessions(userId, keptSessionId, transaction);
    const subject = `person ${userId}`;
    await appendAudit(
      { userId, networkId: null, action: 'person.password', subject, detail: {} },
      transaction,
    );
  });
}

/** Stores a new password that an administrator hands over, and ends every session. */
export function resetPassword(userId: string, passwordHash: string, byUserId: string): Promise<void> {
  return inTransaction(async (transaction) => {
    await updateUser(userId, { passwordHash }, transaction);
    await deleteSessionsOf(userId, transaction);
    const subject = `person ${userId}`;
    await appendAudit(
      { userId: byUserId, networkId: null, action: 'person.password-reset', subject, detail: {} },
      transaction,
    );
  });
}
