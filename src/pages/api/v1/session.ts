import { endSession, sessionCookieName } from '#lib/auth/sessions';
import { signIn } from '#lib/auth/signIn';
import { signInSchema } from '#lib/contracts/people';
import { readJson } from '#lib/http/parse';
import { Problem } from '#lib/http/problem';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { email, password } = await readJson(context.request, signInSchema);
  const agent = context.request.headers.get('user-agent');
  const result = await signIn(email, password, { address: context.clientAddress, agent });
  if (result.outcome === 'too-many') {
    throw new Problem(429, 'too-many-attempts', 'Too many attempts', 'Wait before you try again.', {
      headers: { 'Retry-After': String(result.retryAfterSec) },
    });
  }
  if (result.outcome === 'wrong') {
    throw new Problem(401, 'wrong-credentials', 'Not signed in', 'E-mail address and password do not fit.');
  }
  const { name, value, attributes } = result.cookie;
  context.cookies.set(name, value, attributes);
  return noContent();
});

export const DELETE = route(async (context) => {
  const { name, value, attributes } = await endSession(context.cookies.get(sessionCookieName())?.value);
  context.cookies.set(name, value, attributes);
  return noContent();
});
