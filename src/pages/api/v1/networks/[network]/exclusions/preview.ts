import { requireNetwork } from '#lib/auth/guards';
import { exclusionPreviewAskedSchema } from '#lib/contracts/exclusions';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { previewExclusion } from '#lib/services/exclusions/preview';

export const POST = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const asked = await readJson(context.request, exclusionPreviewAskedSchema);
  return json(valueOf(await previewExclusion(network.id, asked, Math.floor(Date.now() / 1000))));
});
