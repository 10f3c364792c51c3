import { inTransaction } from '#db/queries/connection';
import { deleteOtherSessions, listSessions, sessionDigest } from '#db/queries/sessions';

export interface SessionShown {
  createdAt: Date;
  expiresAt: Date;
  isThisOne: boolean;
}

/** A person's open sessions, newest first. */
export async function sessionsOf(userId: string, currentId: string): Promise<SessionShown[]> {
  const current = sessionDigest(currentId);
  const sessions = await listSessions(userId);
  return sessions.map(({ idDigest, createdAt, expiresAt }) => ({
    createdAt,
    expiresAt,
    isThisOne: idDigest === current,
  }));
}

/** Signs a person out everywhere else; answers how many sessions that ended. */
export function endOtherSessions(userId: string, currentId: string): Promise<number> {
  return inTransaction((transaction) => deleteOtherSessions(userId, currentId, transaction));
}
