import { requireNetwork } from '#lib/auth/guards';
import { requireMast } from '#lib/auth/mastGuard';
import { ALL_ROLES } from '#lib/auth/roles';
import { QUARANTINE_STATES } from '#lib/contracts/quarantine';
import { parseChoice } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { refusedWeather } from '#lib/services/weather/refused';

const MOST_LISTED = 1000;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const mast = await requireMast(network.id, context.params.code);
  const state = parseChoice(context.url, 'state', [...QUARANTINE_STATES, 'all']);
  return json({ items: await refusedWeather(mast, state === 'all' ? null : state, MOST_LISTED) });
});
