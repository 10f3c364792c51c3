import { requireNetwork } from '#lib/auth/guards';
import { newAssignmentSchema } from '#lib/contracts/weather';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { assignMast } from '#lib/services/weather/assign';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newAssignmentSchema);
  const actor = { networkId: network.id, userId: user.id };
  const assignment = valueOf(await assignMast(actor, context.params.code ?? '', input));
  return json({ assignment }, { status: 201 });
});
