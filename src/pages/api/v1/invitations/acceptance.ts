import { join } from '#lib/auth/joining';
import { originOf, setCookies } from '#lib/auth/signInContext';
import { linkPasswordSchema } from '#lib/contracts/invitations';
import { readJson } from '#lib/http/parse';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const given = await readJson(context.request, linkPasswordSchema);
  setCookies(context, await join(given, originOf(context)));
  return noContent();
});
