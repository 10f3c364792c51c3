import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { askedNumbers } from '#lib/http/askedNumbers';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { numbersCsv } from '#lib/services/complaints/numbersCsv';

export const GET = route(async (context) => {
  const { network, settings } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const nowSec = Math.floor(Date.now() / 1000);
  const { numbers, measure } = await askedNumbers(context.url, network, settings, nowSec);
  return csv(numbersCsv(numbers, measure), `${network.slug}-complaint-numbers.csv`);
});
