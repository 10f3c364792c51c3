import { requireAdministrator, requireAdministratorSession } from '#lib/auth/guards';
import { inviteByAdministrator } from '#lib/auth/invitationActs';
import { newInvitationSchema } from '#lib/contracts/invitations';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { openInvitations } from '#lib/services/people/invitations';

export const GET = route(async (context) => {
  requireAdministrator(context);
  return json({ items: await openInvitations(), next: null });
});

export const POST = route(async (context) => {
  const { id: byUserId } = requireAdministratorSession(context);
  const input = await readJson(context.request, newInvitationSchema);
  return json({ id: await inviteByAdministrator(input, byUserId) }, { status: 201 });
});
