import { usePasswordLink } from '#lib/auth/joining';
import { linkPasswordSchema } from '#lib/contracts/invitations';
import { readJson } from '#lib/http/parse';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  await usePasswordLink(await readJson(context.request, linkPasswordSchema));
  return noContent();
});
