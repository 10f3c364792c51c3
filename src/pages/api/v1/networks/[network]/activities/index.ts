import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newActivitySchema } from '#lib/contracts/activities';
import { valueOf } from '#lib/http/outcome';
import { makeCursor, parseCount, parseCursor, parseOptionalPeriod, readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { activityPage } from '#lib/services/activities/list';
import { noteActivity } from '#lib/services/activities/note';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const { items, next } = await activityPage({
    networkId: network.id,
    ...parseOptionalPeriod(context.url),
    kind: context.url.searchParams.get('kind'),
    limit: parseCount(context.url, 'limit', { fallback: 100, most: 1000 }),
    cursor: parseCursor(context.url),
  });
  return json({ items, next: next && makeCursor(next) });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newActivitySchema);
  return json({ activity: valueOf(await noteActivity(network.id, input, user.id)) }, { status: 201 });
});
