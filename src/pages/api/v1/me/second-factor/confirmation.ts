import { requireSession } from '#lib/auth/guards';
import { confirmOwnFactor } from '#lib/auth/ownFactor';
import { factorCodeSchema } from '#lib/contracts/secondFactor';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { user, sessionId } = requireSession(context);
  const { code } = await readJson(context.request, factorCodeSchema);
  return json({ recoveryCodes: await confirmOwnFactor(user, code, sessionId) });
});
