import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newExclusionSchema } from '#lib/contracts/exclusions';
import { makeCursor, parseCount, parseCursor, parseOptionalPeriod, readJson } from '#lib/http/parse';
import { invalidFields } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addExclusion } from '#lib/services/exclusions/add';
import { exclusionPage } from '#lib/services/exclusions/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const code = context.url.searchParams.get('station');
  const station = code === null ? null : await requireStation(network.id, code);
  const page = await exclusionPage({
    networkId: network.id,
    stationId: station?.id ?? null,
    ...parseOptionalPeriod(context.url),
    limit: parseCount(context.url, 'limit', { fallback: 100, most: 1000 }),
    cursor: parseCursor(context.url),
  });
  return json({ items: page.items, next: page.next && makeCursor(page.next) });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { station, from, to, reason } = await readJson(context.request, newExclusionSchema);
  const exclusion = await addExclusion({
    networkId: network.id,
    stationCode: station,
    fromSec: from,
    toSec: to,
    reason,
    userId: user.id,
  });
  if (!exclusion) throw invalidFields([{ field: 'station', message: 'is not a station of this network' }]);
  return json({ exclusion }, { status: 201 });
});
