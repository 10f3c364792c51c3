import { requireAdministratorSession } from '#lib/auth/guards';
import { requirePerson, resetByAdministrator } from '#lib/auth/personActs';
import { passwordResetSchema } from '#lib/contracts/people';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { id: byUserId } = requireAdministratorSession(context);
  const person = await requirePerson(context.params.id);
  const { password } = await readJson(context.request, passwordResetSchema);
  return json({ password: await resetByAdministrator(person, password, byUserId) });
});
