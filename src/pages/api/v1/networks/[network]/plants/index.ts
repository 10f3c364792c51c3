import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newPlantSchema } from '#lib/contracts/plants';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addPlant } from '#lib/services/plants/add';
import { plantsOf } from '#lib/services/plants/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json({ items: await plantsOf(network.id), next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newPlantSchema);
  return json({ plant: valueOf(await addPlant(network.id, input, user.id)) }, { status: 201 });
});
