import { deleteAccountTokens, findAccountToken } from '#db/queries/accountTokens';
import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { deleteOriginsOf } from '#db/queries/knownOrigins';
import { deleteOtherSessions, deleteSessionsOf } from '#db/queries/sessions';
import { findUserById, updateUser, type UserRow } from '#db/queries/users';
import { putLinkMail, tellPerson } from './accountMail';

/** Stores a person's own new password and ends the sessions elsewhere. */
export function changeOwnPassword(
  userId: string,
  passwordHash: string,
  keptSessionId: string,
): Promise<void> {
  return inTransaction(async (transaction) => {
    await deleteOtherSessions(userId, keptSessionId, transaction);
    await storePassword(userId, passwordHash, 'self', transaction);
    await audit(userId, 'person.password', userId, transaction);
  });
}

/** Stores a new password that an administrator hands over, and ends every session. */
export function resetPassword(userId: string, passwordHash: string, byUserId: string): Promise<void> {
  return inTransaction(async (transaction) => {
    await deleteSessionsOf(userId, transaction);
    await storePassword(userId, passwordHash, 'administrator', transaction);
    await audit(byUserId, 'person.password-reset', userId, transaction);
  });
}

/**
 * Has a link to choose a new password sent to an address, if it is somebody's. Whether it is, is looked up only when the message is
 * sent: asking does the same, and takes as long, for every address.
 */
export function askForPasswordLink(email: string): Promise<void> {
  return inTransaction((transaction) => putLinkMail('password-reset', email, transaction));
}

/** The person whose password a link changes, while it holds. */
export function findPersonOfLink(secret: string): Promise<UserRow | undefined> {
  return inTransaction((transaction) => ofLink(secret, transaction));
}

/** Stores the password chosen by a link, once; every session ends, and every browser counts as a stranger. Answers whether the link held. */
export function changePasswordByLink(secret: string, passwordHash: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const user = await ofLink(secret, transaction);
    if (!user) return false;
    await deleteSessionsOf(user.id, transaction);
    await deleteOriginsOf(user.id, transaction);
    await storePassword(user.id, passwordHash, 'link', transaction);
    await audit(user.id, 'person.password-by-link', user.id, transaction);
    return true;
  });
}

async function ofLink(secret: string, transaction: Connection): Promise<UserRow | undefined> {
  const userId = await findAccountToken(secret, 'password-reset', new Date(), transaction);
  const user = userId === undefined ? undefined : await findUserById(userId, transaction);
  return user?.disabledAt ? undefined : user;
}

/** A new password ends every link to choose one, and its owner is told. One that is handed over has to be changed first. */
async function storePassword(
  userId: string,
  passwordHash: string,
  how: 'self' | 'link' | 'administrator',
  transaction: Connection,
): Promise<void> {
  const mustChangePassword = how === 'administrator';
  await updateUser(userId, { passwordHash, mustChangePassword }, transaction);
  await deleteAccountTokens('password-reset', userId, transaction);
  const user = await findUserById(userId, transaction);
  if (user) await tellPerson(user.email, { kind: 'password', how }, new Date(), transaction);
}

function audit(byUserId: string, action: string, userId: string, transaction: Connection): Promise<void> {
  return appendAudit(
    { userId: byUserId, networkId: null, action, subject: `person ${userId}`, detail: {} },
    transaction,
  );
}
