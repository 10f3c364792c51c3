import type { Adapter, DatabaseSession, DatabaseUser } from 'lucia';
import { config } from '#lib/config/index';
import {
  deleteExpiredSessions,
  deleteSession,
  deleteSessionsOf,
  findSession,
  insertSession,
  moveSessionExpiry,
} from '#db/queries/sessions';
import { findUserById } from '#db/queries/users';

const DAY_MS = 86_400_000;

/** Lucia's storage over our queries. Sessions end for good at their absolute lifetime, however much they are used. */
export const sessionStore: Adapter = {
  async getSessionAndUser(id): Promise<[DatabaseSession | null, DatabaseUser | null]> {
    const session = await findSession(id);
    if (!session || session.endsAt.getTime() <= Date.now()) return [null, null];
    const user = await findUserById(session.userId);
    if (!user || user.disabledAt) return [null, null];
    const attributes = { email: user.email, name: user.name, isAdministrator: user.isAdministrator };
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
