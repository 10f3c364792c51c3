import { requireNetwork } from '#lib/auth/guards';
import { mergeSchema } from '#lib/contracts/complaintDeskRoutes';
import { requireDone } from '#lib/http/deskOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { mergedIntoOf } from '#lib/services/complaints/desk/forInterface';
import { mergeCase, unmergeCase } from '#lib/services/complaints/desk/merge';

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['liaison']);
  const { into } = await readJson(context.request, mergeSchema);
  const act = { userId: user.id, network, reference: context.params.reference ?? '' };
  requireDone(await (into === null ? unmergeCase(act) : mergeCase(act, into)));
  return json({ mergedInto: await mergedIntoOf(network, act.reference) });
});
