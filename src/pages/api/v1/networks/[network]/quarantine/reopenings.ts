import { requireNetwork } from '#lib/auth/guards';
import { reopeningSchema } from '#lib/contracts/quarantine';
import { readJson } from '#lib/http/parse';
import { quarantineChoiceOf } from '#lib/http/quarantineFilter';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { reopen } from '#lib/services/quarantine/settle';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const choice = await quarantineChoiceOf(
    await readJson(context.request, reopeningSchema),
    network.id,
    'dismissed',
  );
  return json({ outcome: await reopen(choice, { userId: user.id, networkId: network.id }) });
});
