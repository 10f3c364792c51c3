import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { deleteOtherSessions, deleteSessionOf, listSessions, sessionDigest } from '#db/queries/sessions';

export interface SessionShown {
  /** Names the session without being of use to anybody. */
  id: string;
  /** Network address and browser that signed in; null where they were not noted. */
  address: string | null;
  agent: string | null;
  createdAt: Date;
  /** To the minute. */
  lastSeenAt: Date;
  expiresAt: Date;
  isThisOne: boolean;
}

/** A person's open sessions, newest first. */
export async function sessionsOf(userId: string, currentId: string): Promise<SessionShown[]> {
  const current = sessionDigest(currentId);
  const sessions = await listSessions(userId);
  return sessions.map(({ idDigest, ...session }) => ({
    ...session,
    id: idDigest,
    isThisOne: idDigest === current,
  }));
}

/** Signs a person out everywhere else; answers how many sessions that ended. */
export function endOtherSessions(userId: string, currentId: string): Promise<number> {
  return inTransaction(async (transaction) => {
    const ended = await deleteOtherSessions(userId, currentId, transaction);
    if (ended > 0) await audit(userId, ended, transaction);
    return ended;
  });
}

/** Ends one session of the person at once; answers whether there was one to end. */
export function endSessionOf(userId: string, id: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const isEnded = await deleteSessionOf(userId, id, transaction);
    if (isEnded) await audit(userId, 1, transaction);
    return isEnded;
  });
}

function audit(userId: string, ended: number, transaction: Connection): Promise<void> {
  const entry = { userId, networkId: null, action: 'session.end', subject: `person ${userId}` };
  return appendAudit({ ...entry, detail: { sessions: ended } }, transaction);
}
