import { Lucia, TimeSpan } from 'lucia';
import { config } from '#lib/config/index';
import { listSecondFactorNetworks } from '#db/queries/networks';
import { type SessionOrigin } from '#db/queries/sessions';
import { cookieName, isHttps } from '#lib/http/cookieName';
import { sessionStore } from './sessionStore';

/** The person behind a request. */
export interface SignedInUser {
  id: string;
  email: string;
  name: string;
  isAdministrator: boolean;
  /** Signed in from a browser by a password that was handed over: it is changed before anything else. */
  mustChangePassword?: boolean;
  /** Signed in from a browser without a second factor: networks that ask for one are closed. */
  lacksSecondFactor?: boolean;
  /** An administrator whom a network keeps out so may not administer either. */
  administrationIsClosed?: boolean;
}

declare module 'lucia' {
  interface Register {
    Lucia: Lucia<Record<never, never>, Omit<SignedInUser, 'id'>>;
    DatabaseUserAttributes: Omit<SignedInUser, 'id'>;
    DatabaseSessionAttributes: Partial<SessionOrigin>;
  }
}

/** A cookie to set on the answer. */
export interface SessionCookie {
  name: string;
  value: string;
  attributes: { httpOnly: true; sameSite: 'lax'; path: '/'; secure: boolean; maxAge?: number };
}

/**
 * Everything the rest of the program knows of sessions; Lucia stays behind these functions.
 */
export async function startSession(
  userId: string,
  origin: Partial<SessionOrigin> = {},
): Promise<SessionCookie> {
  const session = await lucia().createSession(userId, origin);
  return cookie(session.id, config().session.maxDays * 86_400);
}

/** The person whose session this is, or null when it is unknown, over or the person may no longer sign in. */
export async function userOfSession(sessionId: string): Promise<SignedInUser | null> {
  const { user } = await lucia().validateSession(sessionId);
  if (!user) return null;
  const { id, email, name, isAdministrator, mustChangePassword, lacksSecondFactor } = user;
  const administrationIsClosed =
    isAdministrator && lacksSecondFactor === true && (await listSecondFactorNetworks()).length > 0;
  return {
    id,
    email,
    name,
    isAdministrator,
    mustChangePassword: mustChangePassword ?? false,
    lacksSecondFactor: lacksSecondFactor ?? true,
    administrationIsClosed,
  };
}

/** Ends a session and answers the cookie that clears it from the browser. */
export async function endSession(sessionId: string | undefined): Promise<SessionCookie> {
  if (sessionId) await lucia().invalidateSession(sessionId);
  return cookie('', 0);
}

/** Name of the session cookie; `__Host-` wherever the public address is https. */
export function sessionCookieName(): string {
  return cookieName('session');
}

let instance: ReturnType<typeof makeLucia> | undefined;

function lucia() {
  instance ??= makeLucia();
  return instance;
}

function makeLucia() {
  return new Lucia(sessionStore, {
    sessionExpiresIn: new TimeSpan(config().session.idleHours, 'h'),
    sessionCookie: { name: sessionCookieName(), attributes: { secure: isHttps() } },
    getUserAttributes: ({ email, name, isAdministrator, mustChangePassword, lacksSecondFactor }) => ({
      email,
      name,
      isAdministrator,
      mustChangePassword,
      lacksSecondFactor,
    }),
  });
}

function cookie(value: string, maxAgeSec: number): SessionCookie {
  return cookieNamed('session', value, maxAgeSec);
}

/** A cookie of the whole site, by its short name, that no script reads and that other sites' forms do not bring along. */
export function cookieNamed(name: string, value: string, maxAgeSec: number): SessionCookie {
  const attributes = {
    httpOnly: true,
    sameSite: 'lax',
    path: '/',
    secure: isHttps(),
    maxAge: maxAgeSec,
  } as const;
  return { name: cookieName(name), value, attributes };
}
