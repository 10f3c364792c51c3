import { requireNetwork } from '#lib/auth/guards';
import { noteWithdrawalSchema } from '#lib/contracts/complaintDeskRoutes';
import { requireDone } from '#lib/http/deskOutcome';
import { idOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { withdrawNote } from '#lib/services/complaints/desk/notes';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['liaison']);
  const { isWithdrawn } = await readJson(context.request, noteWithdrawalSchema);
  const act = { userId: user.id, network, reference: context.params.reference ?? '' };
  requireDone(await withdrawNote(act, idOf(context.params.id), !isWithdrawn));
  return json({ isWithdrawn });
});
