import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { instrumentChangesSchema } from '#lib/contracts/instruments';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { notFound } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeInstrument } from '#lib/services/instruments/change';
import { instrumentWithStays } from '#lib/services/instruments/list';

const nowSec = () => Math.floor(Date.now() / 1000);

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const found = await instrumentWithStays(network.id, idOf(context.params.id), nowSec());
  if (!found) throw notFound('The network has no instrument with this number.');
  return json(found);
});

export const PATCH = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const changes = await readJson(context.request, instrumentChangesSchema);
  const act = { networkId: network.id, id: idOf(context.params.id), userId: user.id, nowSec: nowSec() };
  return json({ instrument: valueOf(await changeInstrument(act, changes)) });
});
