import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { seekerOf } from '#lib/auth/seeker';
import { searchQuerySchema } from '#lib/contracts/search';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { findInNetwork } from '#lib/services/search/find';

export const GET = route(async (context) => {
  const access = await requireNetwork(context, context.params.network, ALL_ROLES);
  const { q } = searchQuerySchema.parse(Object.fromEntries(context.url.searchParams));
  return json({ items: await findInNetwork(seekerOf(access), q), next: null });
});
