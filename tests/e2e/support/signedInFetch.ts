import { inject } from 'vitest';

/** Signs an account in through the interface, a demo account without a password, and answers a caller that carries its session. */
export async function signedInFetch(email: string, password = inject('demoPassword')) {
  const origin = inject('origin');
  const session = await fetch(`${origin}/api/v1/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify({ email, password }),
  });
  if (session.status !== 204) throw new Error(`Sign-in failed: ${session.status} ${await session.text()}`);
  const cookie = session.headers
    .getSetCookie()
    .map((value) => value.split(';')[0])
    .join('; ');

  /** A body goes as JSON; text with a type of its own goes as it is. */
  return (method: string, path: string, body?: unknown, type = 'application/json'): Promise<Response> =>
    fetch(`${origin}${path}`, {
      method,
      headers: { Cookie: cookie, ...(body === undefined ? {} : { 'Content-Type': type }) },
      body: typeof body === 'string' || body === undefined ? (body ?? null) : JSON.stringify(body),
    });
}
