import { requireNetwork } from '#lib/auth/guards';
import { notAllowed } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { publicKeys, rotateSigningKey } from '#lib/services/summaries/seal/keys';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['operator']);
  if (!user.isAdministrator) throw notAllowed('Only an administrator may change the signing key.');
  await rotateSigningKey(network.id, user.id);
  return json({ items: await publicKeys(network.id) });
});
