import { requireAdministratorSession, requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { formatInstantUtc } from '#lib/contracts/instants';
import { retentionChangeSchema, type RetentionAnswer } from '#lib/contracts/retention';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeRetention, retentionOf } from '#lib/services/retention/settings';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json(await answerOf(network.id));
});

export const PUT = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const { id: userId } = requireAdministratorSession(context);
  const { keepMonths } = await readJson(context.request, retentionChangeSchema);
  await changeRetention({ networkId: network.id, userId }, keepMonths);
  return json(await answerOf(network.id));
});

async function answerOf(networkId: number): Promise<RetentionAnswer> {
  const { keepMonths, seal } = await retentionOf(networkId);
  return {
    keepMonths,
    sealedBefore: seal && formatInstantUtc(seal.sealedBeforeSec),
    keptFrom: seal && formatInstantUtc(seal.keptFromSec),
  };
}
