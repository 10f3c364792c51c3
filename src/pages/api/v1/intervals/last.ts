import { requireStationToken } from '#lib/auth/guards';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { lastInterval } from '#lib/services/intervals/last';

export const GET = route(async ({ request }) => {
  const station = await requireStationToken(request);
  return json(await lastInterval(station.id, Math.floor(Date.now() / 1000)));
});
