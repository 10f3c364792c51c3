import { requireNetwork, requireStation } from '#lib/auth/guards';
import { clockEpisodeSchema } from '#lib/contracts/clockShifts';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { previewShift } from '#lib/services/clockShifts/preview';

export const POST = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const asked = await readJson(context.request, clockEpisodeSchema);
  return json(valueOf(await previewShift(station, asked, Math.floor(Date.now() / 1000))));
});
