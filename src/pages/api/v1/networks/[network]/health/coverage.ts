import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parseDates } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { coverageDays } from '#lib/services/health/coverage';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.url.searchParams.get('station') ?? '');
  const dates = parseDates(context.url);
  const days = await coverageDays(station, dates.fromDate, dates.toDate, Math.floor(Date.now() / 1000));
  return json({ days });
});
