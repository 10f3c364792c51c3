import { requireNetwork } from '#lib/auth/guards';
import { requireMast } from '#lib/auth/mastGuard';
import { weatherSettlementSchema } from '#lib/contracts/weatherQuarantine';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { settleWeather } from '#lib/services/weather/refused';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const mast = await requireMast(network.id, context.params.code);
  const settling = await readJson(context.request, weatherSettlementSchema);
  return json({ outcome: await settleWeather(mast, settling, user.id, new Date()) });
});
