import { requireAdministrator, requireAdministratorSession } from '#lib/auth/guards';
import { patchByAdministrator, requirePerson } from '#lib/auth/personActs';
import { personPatchSchema } from '#lib/contracts/people';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { personView } from '#lib/services/people/view';

export const GET = route(async (context) => {
  requireAdministrator(context);
  return json({ person: personView(await requirePerson(context.params.id)) });
});

export const PATCH = route(async (context) => {
  const { id: byUserId } = requireAdministratorSession(context);
  const person = await requirePerson(context.params.id);
  const patch = await readJson(context.request, personPatchSchema);
  await patchByAdministrator(person, patch, byUserId);
  return json({ person: personView(await requirePerson(person.user.id)) });
});
