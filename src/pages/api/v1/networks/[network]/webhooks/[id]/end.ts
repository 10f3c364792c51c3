import { requireNetwork } from '#lib/auth/guards';
import { idOf, valueOf } from '#lib/http/outcome';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { removeWebhook } from '#lib/services/webhooks/webhooks';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const actor = { networkId: network.id, userId: user.id };
  valueOf(await removeWebhook(actor, idOf(context.params.id)));
  return noContent();
});
