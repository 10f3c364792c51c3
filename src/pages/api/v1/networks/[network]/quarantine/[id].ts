import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { notFound } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { quarantinedRecord } from '#lib/services/quarantine/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const id = /^\d{1,15}$/.test(context.params.id ?? '') ? Number(context.params.id) : 0;
  const record = await quarantinedRecord(network.id, id);
  if (!record) throw notFound('The network has no refused record with this number.');
  return json({ record });
});
