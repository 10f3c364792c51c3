import { requireSession } from '#lib/auth/guards';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { endOtherSessions, sessionsOf } from '#lib/services/people/sessions';
import { sessionView } from '#lib/services/people/view';

export const GET = route(async (context) => {
  const { user, sessionId } = requireSession(context);
  const sessions = await sessionsOf(user.id, sessionId);
  return json({ items: sessions.map(sessionView), next: null });
});

export const DELETE = route(async (context) => {
  const { user, sessionId } = requireSession(context);
  return json({ ended: await endOtherSessions(user.id, sessionId) });
});
