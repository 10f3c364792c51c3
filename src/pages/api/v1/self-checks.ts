import { requireStationToken } from '#lib/auth/guards';
import { selfChecksSchema } from '#lib/contracts/drift';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { takeSelfChecks } from '#lib/services/drift/selfChecks';

export const POST = route(async ({ request }) => {
  const station = await requireStationToken(request);
  const checks = await readJson(request, selfChecksSchema);
  return json(await takeSelfChecks(station.id, checks, new Date()));
});
