import { requireUser } from '#lib/auth/guards';
import { notFound } from '#lib/http/problem';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { endAccessToken } from '#lib/services/people/accessTokens';

export const DELETE = route(async (context) => {
  const user = requireUser(context);
  const id = /^\d{1,10}$/.test(context.params.id ?? '') ? Number(context.params.id) : 0;
  const isEnded = await endAccessToken(user.id, id);
  if (!isEnded) throw notFound('You have no such token in force.');
  return noContent();
});
