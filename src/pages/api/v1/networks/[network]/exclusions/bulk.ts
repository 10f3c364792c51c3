import { requireNetwork } from '#lib/auth/guards';
import { bulkExclusionSchema } from '#lib/contracts/exclusions';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { excludeAtStations } from '#lib/services/exclusions/bulk';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const given = await readJson(context.request, bulkExclusionSchema);
  const items = valueOf(await excludeAtStations({ networkId: network.id, userId: user.id }, given));
  return json({ items }, { status: 201 });
});
