import { requireNetwork } from '#lib/auth/guards';
import { newDeploymentSchema } from '#lib/contracts/instruments';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { deploy } from '#lib/services/instruments/deploy';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newDeploymentSchema);
  const act = {
    networkId: network.id,
    instrumentId: idOf(context.params.id),
    userId: user.id,
    nowSec: Math.floor(Date.now() / 1000),
  };
  return json({ deployment: valueOf(await deploy(act, input)) }, { status: 201 });
});
