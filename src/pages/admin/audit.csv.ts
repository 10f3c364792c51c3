import { requireAdministratorSession } from '#lib/auth/guards';
import { homeZone } from '#lib/auth/homeZone';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { auditCsv } from '#lib/services/audit/auditCsv';
import { auditQuery } from './_auditQuery';

/** The acts that the page shows, in one file. */
export const GET = route(async (context) => {
  const user = requireAdministratorSession(context);
  const { filter } = await auditQuery(context.url, await homeZone(user));
  return csv(await auditCsv(filter), 'audit-trail.csv');
});
