import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newInstrumentSchema } from '#lib/contracts/instruments';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addInstrument } from '#lib/services/instruments/add';
import { instrumentsOf } from '#lib/services/instruments/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const items = await instrumentsOf(network.id, Math.floor(Date.now() / 1000));
  return json({ items, next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newInstrumentSchema);
  return json({ instrument: valueOf(await addInstrument(network.id, input, user.id)) }, { status: 201 });
});
