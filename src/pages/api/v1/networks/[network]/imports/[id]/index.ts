import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { importIdOf, unknownImport } from '#lib/http/importOutcome';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { importOf } from '#lib/services/imports/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const found = await importOf(network.id, importIdOf(context.params.id));
  if (!found) throw unknownImport();
  return json({ import: found });
});
