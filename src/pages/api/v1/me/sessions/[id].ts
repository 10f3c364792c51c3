import { requireSession } from '#lib/auth/guards';
import { notFound } from '#lib/http/problem';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { endSessionOf } from '#lib/services/people/sessions';

export const DELETE = route(async (context) => {
  const { user } = requireSession(context);
  const isEnded = await endSessionOf(user.id, context.params.id ?? '');
  if (!isEnded) throw notFound('You have no such session open.');
  return noContent();
});
