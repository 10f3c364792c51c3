import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parseExceedanceFilter } from '#lib/http/exceedanceFilter';
import { badRequest } from '#lib/http/problem';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { exceedancesCsv, MOST_CSV_EXCEEDANCES } from '#lib/services/exceedances/csv';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const text = await exceedancesCsv(network.id, await parseExceedanceFilter(context.url, network.id));
  if (text === null) {
    throw badRequest(`The list has more than ${MOST_CSV_EXCEEDANCES} exceedances; ask for a shorter period.`);
  }
  return csv(text, `${network.slug}-exceedances.csv`);
});
