import { requireNetwork } from '#lib/auth/guards';
import { mayStillEnter } from '#lib/auth/mayStillEnter';
import { ALL_ROLES } from '#lib/auth/roles';
import { liveStream } from '#lib/http/liveStream';
import { route } from '#lib/http/route';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const mayListen = () => mayStillEnter(context, network.slug, ALL_ROLES);
  return liveStream({ networkId: network.id, userId: user.id, mayListen });
});
