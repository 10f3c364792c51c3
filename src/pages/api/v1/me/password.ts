import { requireSessionForPassword } from '#lib/auth/guards';
import { changePassword } from '#lib/auth/ownPassword';
import { ownPasswordChangeSchema } from '#lib/contracts/people';
import { readJson } from '#lib/http/parse';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { user, sessionId } = requireSessionForPassword(context);
  await changePassword(user, sessionId, await readJson(context.request, ownPasswordChangeSchema));
  return noContent();
});
