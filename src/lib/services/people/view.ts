import { type AccessTokenRow } from '#db/queries/accessTokens';
import { type AccessToken } from '#lib/contracts/accessTokens';
import { type OpenSession } from '#lib/contracts/account';
import { type PersonEntry } from '#lib/contracts/people';
import { type Person } from './list';
import { type SessionShown } from './sessions';

/** A person as the interface answers it. */
export function personView({ user, roles, hasSecondFactor }: Person): PersonEntry {
  return {
    id: user.id,
    name: user.name,
    email: user.email,
    isAdministrator: user.isAdministrator,
    createdAt: user.createdAt.toISOString(),
    disabledAt: user.disabledAt?.toISOString() ?? null,
    hasSecondFactor,
    roles: roles.map(({ network, role }) => ({ network: network.slug, role })),
  };
}

/** An access token as the interface answers it: never the secret. */
export function accessTokenView(row: AccessTokenRow): AccessToken {
  return {
    id: row.id,
    name: row.name,
    access: row.access,
    families: row.families,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
    revokedAt: row.revokedAt?.toISOString() ?? null,
  };
}

/** A session as the interface answers it. */
export function sessionView({ createdAt, lastSeenAt, expiresAt, ...session }: SessionShown): OpenSession {
  return {
    ...session,
    createdAt: createdAt.toISOString(),
    lastSeenAt: lastSeenAt.toISOString(),
    expiresAt: expiresAt.toISOString(),
  };
}
