import { requireNetwork } from '#lib/auth/guards';
import { limitTrialSchema } from '#lib/contracts/limitTrial';
import { jobEvents, wantsEvents } from '#lib/http/jobEvents';
import { jobProblem } from '#lib/http/jobProblem';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { runTrial } from '#lib/services/limitTrial/runTrial';

export const POST = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const query = await readJson(context.request, limitTrialSchema);
  const task = { networkId: network.id, query, nowSec: Math.floor(Date.now() / 1000) };
  if (wantsEvents(context.request)) {
    const told = { kind: 'trial', path: context.url.pathname } as const;
    return jobEvents(async (listener) => valueOf(await runTrial(task, listener)), told);
  }
  try {
    return json(valueOf(await runTrial(task, { signal: context.request.signal })));
  } catch (error) {
    throw jobProblem(error, 'trial');
  }
});
