import { requireNetwork } from '#lib/auth/guards';
import { limitTrialSchema } from '#lib/contracts/limitTrial';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { tryLimit } from '#lib/services/limitTrial/tryLimit';

export const POST = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const query = await readJson(context.request, limitTrialSchema);
  return json(valueOf(await tryLimit(network.id, query, Math.floor(Date.now() / 1000))));
});
