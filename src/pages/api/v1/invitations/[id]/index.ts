import { requireAdministratorSession } from '#lib/auth/guards';
import { takeBack } from '#lib/auth/invitationActs';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const DELETE = route(async (context) => {
  const { id: byUserId } = requireAdministratorSession(context);
  await takeBack(context.params.id, byUserId);
  return noContent();
});
