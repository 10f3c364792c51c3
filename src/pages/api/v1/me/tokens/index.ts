import { requireSession, requireUser } from '#lib/auth/guards';
import { makeOwnToken } from '#lib/auth/ownTokens';
import { newAccessTokenSchema } from '#lib/contracts/accessTokens';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { accessTokensOf } from '#lib/services/people/accessTokens';
import { accessTokenView } from '#lib/services/people/view';

export const GET = route(async (context) => {
  const tokens = await accessTokensOf(requireUser(context).id);
  return json({ items: tokens.map(accessTokenView), next: null });
});

export const POST = route(async (context) => {
  const { user } = requireSession(context);
  const token = await readJson(context.request, newAccessTokenSchema);
  return json({ token: await makeOwnToken(user, token) }, { status: 201 });
});
