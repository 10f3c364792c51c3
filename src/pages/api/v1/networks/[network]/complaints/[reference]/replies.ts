import { requireNetwork } from '#lib/auth/guards';
import { newReplySchema } from '#lib/contracts/complaints';
import { readJson } from '#lib/http/parse';
import { notFound, Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { answerCase, unsentReason } from '#lib/services/complaints/answerCase';

export const POST = route(async (context) => {
  const { user, network } = await requireNetwork(context, context.params['network'], ['liaison']);
  const reply = await readJson(context.request, newReplySchema);
  const outcome = await answerCase(user.id, network, context.params['reference'] ?? '', reply, new Date());
  if (outcome.kind === 'unknown') throw notFound('The network has no complaint with this reference.');
  if (outcome.kind !== 'sent') {
    const status = outcome.kind === 'text-refused' ? 422 : 409;
    throw new Problem(status, outcome.kind, 'The answer was not sent', unsentReason(outcome));
  }
  return json({ reply: outcome.reply }, { status: 201 });
});
