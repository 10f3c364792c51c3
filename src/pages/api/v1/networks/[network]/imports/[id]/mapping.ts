import { mapColumns } from '#ingest/imports/map';
import { requireNetwork } from '#lib/auth/guards';
import { importMappingSchema } from '#lib/contracts/imports';
import { importFrom, importIdOf } from '#lib/http/importOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const mapping = await readJson(context.request, importMappingSchema);
  const asked = { networkId: network.id, id: importIdOf(context.params.id), userId: user.id };
  return json({ import: importFrom(await mapColumns(asked, mapping)) });
});
