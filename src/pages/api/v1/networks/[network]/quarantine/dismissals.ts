import { requireNetwork } from '#lib/auth/guards';
import { dismissalSchema } from '#lib/contracts/quarantine';
import { readJson } from '#lib/http/parse';
import { quarantineChoiceOf } from '#lib/http/quarantineFilter';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { dismiss } from '#lib/services/quarantine/settle';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { reason, ...asked } = await readJson(context.request, dismissalSchema);
  const choice = await quarantineChoiceOf(asked, network.id, 'open');
  return json({ outcome: await dismiss(choice, { userId: user.id, networkId: network.id, reason }) });
});
