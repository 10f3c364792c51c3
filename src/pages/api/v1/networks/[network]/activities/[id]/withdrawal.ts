import { requireNetwork } from '#lib/auth/guards';
import { activityWithdrawalSchema } from '#lib/contracts/activities';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { withdrawEntry } from '#lib/services/activities/note';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { reason } = await readJson(context.request, activityWithdrawalSchema);
  const entry = { networkId: network.id, id: idOf(context.params.id), userId: user.id };
  return json({ activity: valueOf(await withdrawEntry(entry, reason)) });
});
