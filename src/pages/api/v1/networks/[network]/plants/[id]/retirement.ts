import { requireNetwork } from '#lib/auth/guards';
import { plantRetirementSchema } from '#lib/contracts/plants';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { retirePlant } from '#lib/services/plants/change';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, plantRetirementSchema);
  const act = { networkId: network.id, plantId: idOf(context.params.id), userId: user.id };
  return json({ plant: valueOf(await retirePlant(act, input)) });
});
