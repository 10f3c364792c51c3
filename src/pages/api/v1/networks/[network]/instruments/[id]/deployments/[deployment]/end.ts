import { requireNetwork } from '#lib/auth/guards';
import { deploymentEndSchema } from '#lib/contracts/instruments';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { endStay } from '#lib/services/instruments/changeStay';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { to } = await readJson(context.request, deploymentEndSchema);
  const act = {
    networkId: network.id,
    instrumentId: idOf(context.params.id),
    deploymentId: idOf(context.params.deployment),
    userId: user.id,
    nowSec: Math.floor(Date.now() / 1000),
  };
  return json({ deployment: valueOf(await endStay(act, to)) });
});
