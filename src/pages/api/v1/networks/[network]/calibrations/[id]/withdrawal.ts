import { requireNetwork } from '#lib/auth/guards';
import { calibrationWithdrawalSchema } from '#lib/contracts/calibrations';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { withdrawCheck } from '#lib/services/calibrations/change';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { reason } = await readJson(context.request, calibrationWithdrawalSchema);
  const act = { networkId: network.id, id: idOf(context.params.id), userId: user.id };
  return json({ calibration: valueOf(await withdrawCheck(act, reason)) });
});
