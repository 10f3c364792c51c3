import { requireNetwork } from '#lib/auth/guards';
import { newWebhookSchema } from '#lib/contracts/alertRoutes';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { deliveryJson, webhookJson } from '#lib/services/webhooks/webhookJson';
import { addWebhook, webhooksOf } from '#lib/services/webhooks/webhooks';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const { webhooks, deliveries } = await webhooksOf(network.id);
  return json({ items: webhooks.map(webhookJson), deliveries: deliveries.map(deliveryJson) });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { url } = await readJson(context.request, newWebhookSchema);
  const added = valueOf(await addWebhook({ networkId: network.id, userId: user.id }, url));
  return json({ webhook: webhookJson(added.webhook), secret: added.secret }, { status: 201 });
});
