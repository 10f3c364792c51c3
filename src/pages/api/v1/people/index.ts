import { requireAdministrator, requireAdministratorSession } from '#lib/auth/guards';
import { addByAdministrator, requirePerson } from '#lib/auth/personActs';
import { newPersonSchema } from '#lib/contracts/people';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { listPeople } from '#lib/services/people/list';
import { personView } from '#lib/services/people/view';

export const GET = route(async (context) => {
  requireAdministrator(context);
  const people = await listPeople();
  return json({ items: people.map(personView), next: null });
});

export const POST = route(async (context) => {
  const { id: byUserId } = requireAdministratorSession(context);
  const input = await readJson(context.request, newPersonSchema);
  const { id, password } = await addByAdministrator(input, byUserId);
  return json({ person: personView(await requirePerson(id)), password }, { status: 201 });
});
