import { askForLink } from '#lib/auth/joining';
import { passwordLinkSchema } from '#lib/contracts/invitations';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { email } = await readJson(context.request, passwordLinkSchema);
  await askForLink(email, context.clientAddress);
  return json({ detail: 'If the address is somebody’s, a message is on its way.' }, { status: 202 });
});
