import type { APIContext } from 'astro';
import { requireNetwork } from '#lib/auth/guards';
import { newAssignmentSchema } from '#lib/contracts/complaintDeskRoutes';
import { requireDone, unknownComplaint } from '#lib/http/deskOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { assignCase } from '#lib/services/complaints/desk/assign';
import type { DeskAct } from '#lib/services/complaints/desk/deskAct';
import { assignmentOf } from '#lib/services/complaints/desk/forInterface';

export const GET = route(async (context) => answer(await actOf(context)));

export const PUT = route(async (context) => {
  const act = await actOf(context);
  const { to } = await readJson(context.request, newAssignmentSchema);
  requireDone(await assignCase(act, to));
  return answer(act);
});

async function actOf(context: APIContext): Promise<DeskAct> {
  const { network, user } = await requireNetwork(context, context.params.network, ['liaison']);
  return { userId: user.id, network, reference: context.params.reference ?? '' };
}

async function answer({ network, reference }: DeskAct): Promise<Response> {
  const assignment = await assignmentOf(network, reference);
  if (!assignment) throw unknownComplaint();
  return json(assignment);
}
