import type { APIRoute } from 'astro';
import { endSession, sessionCookieName } from '#lib/auth/sessions';

/** Ends the session in this browser. */
export const POST: APIRoute = async ({ cookies, redirect }) => {
  const { name, value, attributes } = await endSession(cookies.get(sessionCookieName())?.value);
  cookies.set(name, value, attributes);
  return redirect('/sign-in', 303);
};
