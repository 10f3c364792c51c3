import { requireNetwork } from '#lib/auth/guards';
import { withdrawalSchema } from '#lib/contracts/exclusions';
import { readJson } from '#lib/http/parse';
import { notFound, Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { withdraw } from '#lib/services/exclusions/withdraw';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const id = /^\d{1,9}$/.test(context.params.id ?? '') ? Number(context.params.id) : 0;
  const { reason } = await readJson(context.request, withdrawalSchema);
  const result = await withdraw({ networkId: network.id, id, reason, userId: user.id });
  if (result.outcome === 'unknown') throw notFound('The network has no exclusion with this number.');
  if (result.outcome === 'withdrawn-before') {
    throw new Problem(
      409,
      'withdrawn-before',
      'Withdrawn before',
      'Somebody has withdrawn this exclusion already.',
    );
  }
  return json({ exclusion: result.exclusion });
});
