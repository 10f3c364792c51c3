import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { exceedanceId } from '#lib/http/exceedanceFilter';
import { notFound } from '#lib/http/problem';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { exceedanceEventsCsv } from '#lib/services/exceedances/detail';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const id = exceedanceId(context.params.id);
  const text = await exceedanceEventsCsv(network.id, id);
  if (text === null) throw notFound('The network has no exceedance of a limit on events with this number.');
  return csv(text, `${network.slug}-exceedance-${id}-events.csv`);
});
