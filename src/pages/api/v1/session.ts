import { endSession, sessionCookieName } from '#lib/auth/sessions';
import { signIn } from '#lib/auth/signIn';
import { originOf, setCookies } from '#lib/auth/signInContext';
import { tooManyAttempts } from '#lib/auth/tooMany';
import { signInSchema } from '#lib/contracts/people';
import { readJson } from '#lib/http/parse';
import { Problem } from '#lib/http/problem';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

const refusal = (code: string, detail: string) => new Problem(401, code, 'Not signed in', detail);

export const POST = route(async (context) => {
  const given = await readJson(context.request, signInSchema);
  const result = await signIn(given, originOf(context));
  switch (result.outcome) {
    case 'too-many':
      throw tooManyAttempts(result.retryAfterSec, 'You are not signed in.');
    case 'wrong':
      throw refusal('wrong-credentials', 'E-mail address and password do not fit.');
    case 'code-needed':
      throw refusal(
        'second-factor-needed',
        'Send the same again with `code`, of the authenticator or a recovery code.',
      );
    case 'wrong-code':
      throw refusal('wrong-code', 'The code does not hold now, or was used already.');
    case 'signed-in':
      setCookies(context, result.cookies);
      return noContent();
  }
});

export const DELETE = route(async (context) => {
  const { name, value, attributes } = await endSession(context.cookies.get(sessionCookieName())?.value);
  context.cookies.set(name, value, attributes);
  return noContent();
});
