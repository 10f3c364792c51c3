import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { readiness } from '#lib/services/operation/readiness';

/** Whether the whole can do its work: 503 for the database, migrations or a dead worker, never for a backlog. */
export const GET = route(async () => {
  const state = await readiness(new Date());
  const headers: Record<string, string> = state.isReady ? {} : { 'Retry-After': '10' };
  return json(state.report, { status: state.isReady ? 200 : 503, headers });
});
