import { requireAdministratorSession } from '#lib/auth/guards';
import { requirePerson, resetFactor } from '#lib/auth/personActs';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const DELETE = route(async (context) => {
  const { id: byUserId } = requireAdministratorSession(context);
  await resetFactor(await requirePerson(context.params.id), byUserId);
  return noContent();
});
