import type { Adapter, DatabaseSession, DatabaseUser } from 'lucia';
import { config } from '#lib/config/index';
import {
  deleteExpiredSessions,
  deleteSession,
  deleteSessionsOf,
  findSession,
  insertSession,
  moveSessionExpiry,
  noteSessionSeen,
} from '#db/queries/sessions';
import { hasSecondFactor } from '#db/queries/secondFactors';
import { findUserById } from '#db/queries/users';
import { log } from '#lib/config/log';

const DAY_MS = 86_400_000;
/** How exactly it is kept when a session was seen last. */
const SEEN_MS = 60_000;

/** Lucia's storage over our queries. Sessions end for good at their absolute lifetime, however much they are used. */
export const sessionStore: Adapter = {
  async getSessionAndUser(id): Promise<[DatabaseSession | null, DatabaseUser | null]> {
    const session = await findSession(id);
    if (!session || session.endsAt.getTime() <= Date.now()) return [null, null];
    const [user, hasFactor] = await Promise.all([
      findUserById(session.userId),
      hasSecondFactor(session.userId),
    ]);
    if (!user || user.disabledAt) return [null, null];
    await noteSeen(id, session.lastSeenAt);
    const { email, name, isAdministrator, mustChangePassword } = user;
    const attributes = { email, name, isAdministrator, mustChangePassword, lacksSecondFactor: !hasFactor };
    return [
      { id, userId: session.userId, expiresAt: session.expiresAt, attributes: {} },
      { id: user.id, attributes },
    ];
  },
  // Sessions are listed from the database by person, never through Lucia: their ids are not stored.
  async getUserSessions() {
    return [];
  },
  async setSession(session) {
    const endsAt = new Date(Date.now() + config().session.maxDays * DAY_MS);
    const { userId, expiresAt, attributes } = session;
    await insertSession(session.id, { userId, expiresAt, endsAt, ...attributes });
  },
  updateSessionExpiration: (id, expiresAt) => moveSessionExpiry(id, expiresAt),
  deleteSession: (id) => deleteSession(id),
  deleteUserSessions: (userId) => deleteSessionsOf(userId),
  async deleteExpiredSessions() {
    await deleteExpiredSessions(new Date());
  },
};

/** A database that takes nothing at the moment keeps nobody from reading. */
async function noteSeen(id: string, lastSeenAt: Date | null): Promise<void> {
  const now = new Date();
  if (lastSeenAt && now.getTime() - lastSeenAt.getTime() < SEEN_MS) return;
  try {
    await noteSessionSeen(id, now);
  } catch (error) {
    log().debug({ err: error }, 'session not noted as seen');
  }
}
