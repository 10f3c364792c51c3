import { requireNetwork } from '#lib/auth/guards';
import { assignmentEndSchema } from '#lib/contracts/weather';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { endMastAssignment } from '#lib/services/weather/assign';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { to } = await readJson(context.request, assignmentEndSchema);
  const actor = { networkId: network.id, userId: user.id };
  return json({ assignment: valueOf(await endMastAssignment(actor, idOf(context.params.id), to)) });
});
