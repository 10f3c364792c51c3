import { requireNetwork } from '#lib/auth/guards';
import { withdrawalSchema } from '#lib/contracts/exclusions';
import { idOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { notFound, Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { withdrawAct } from '#lib/services/exclusions/withdraw';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { reason } = await readJson(context.request, withdrawalSchema);
  const id = idOf(context.params.id);
  const result = await withdrawAct({ networkId: network.id, id, reason, userId: user.id });
  if (result.outcome === 'unknown')
    throw notFound('The network has no exclusions of an act with this number.');
  if (result.outcome === 'withdrawn-before') {
    throw new Problem(
      409,
      'withdrawn-before',
      'Withdrawn before',
      'Every exclusion of this act has been withdrawn already.',
    );
  }
  return json({ items: result.exclusions });
});
