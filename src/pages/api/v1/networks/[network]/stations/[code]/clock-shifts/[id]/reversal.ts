import { requireNetwork, requireStation } from '#lib/auth/guards';
import { shiftReversalSchema } from '#lib/contracts/clockShifts';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { reverseShift } from '#lib/services/clockShifts/reverse';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const { reason } = await readJson(context.request, shiftReversalSchema);
  const shift = valueOf(await reverseShift(station, idOf(context.params.id), reason, user.id));
  return json({ shift }, { status: 202 });
});
