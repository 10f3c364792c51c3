import { requireNetwork } from '#lib/auth/guards';
import { mastChangeSchema } from '#lib/contracts/weather';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeMast } from '#lib/services/weather/masts';

export const PATCH = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, mastChangeSchema);
  const mast = valueOf(await changeMast(network.id, context.params.code ?? '', input, user.id));
  return json({ mast });
});
