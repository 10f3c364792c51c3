import type { APIRoute } from 'astro';
import { endSession, sessionCookieName } from '#lib/auth/sessions';

/** Ends the session in this browser. */
export const POST: APIRoute = async ({ cookies, redirect }) => {
  const { name, value, attributes } = await endSession(cookies.get(sessionCookieName())?.value);
  cookies.set(name, value, attributes);
  const answer = redirect('/sign-in', 303);
  // Pages that the browser keeps to go back to would show what only the person may see.
  answer.headers.set('Clear-Site-Data', '"cache"');
  return answer;
};
