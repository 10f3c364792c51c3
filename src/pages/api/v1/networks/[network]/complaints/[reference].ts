import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES, mayAct } from '#lib/auth/roles';
import { notFound } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { openCase } from '#lib/services/complaints/openCase';

export const GET = route(async (context) => {
  const { user, network, settings, roles } = await requireNetwork(
    context,
    context.params['network'],
    ALL_ROLES,
  );
  const reader = {
    userId: user.id,
    mayReadPersonalData: mayAct(user, roles, ['liaison']),
    network,
    settings,
  };
  const found = await openCase(reader, context.params['reference'] ?? '', new Date());
  if (!found) throw notFound('The network has no complaint with this reference.');
  const { complaint, evidence, replies, person } = found;
  return json({ ...complaint, evidence, replies, ...(person === undefined ? {} : { private: person }) });
});
