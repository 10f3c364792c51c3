import { requireAdministratorSession } from '#lib/auth/guards';
import { sendAgain } from '#lib/auth/invitationActs';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { id: byUserId } = requireAdministratorSession(context);
  await sendAgain(context.params.id, byUserId);
  return noContent();
});
