import { requireSession } from '#lib/auth/guards';
import { endOwnFactor } from '#lib/auth/ownFactor';
import { factorEndSchema } from '#lib/contracts/secondFactor';
import { readJson } from '#lib/http/parse';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { user } = requireSession(context);
  const { password } = await readJson(context.request, factorEndSchema);
  await endOwnFactor(user, password);
  return noContent();
});
