import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { valueOf } from '#lib/http/outcome';
import { parseOptionalPeriod } from '#lib/http/parse';
import { Problem } from '#lib/http/problem';
import { readBytes } from '#lib/http/readBytes';
import { csv, json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { noteFile } from '#lib/services/activities/file';
import { activitiesCsv } from '#lib/services/activities/list';

const MOST_BYTES = 2 * 1024 * 1024;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const kind = context.url.searchParams.get('kind');
  const text = await activitiesCsv(network.id, parseOptionalPeriod(context.url), kind);
  return csv(text, `${network.slug}-operations.csv`);
});

export const POST = route(async (context) => {
  const { network, settings, user } = await requireNetwork(context, context.params.network, ['operator']);
  if (!/^text\/csv\s*(;|$)/i.test(context.request.headers.get('content-type') ?? '')) {
    throw new Problem(415, 'wrong-type', 'Wrong content type', 'Send CSV with Content-Type: text/csv.');
  }
  const text = new TextDecoder().decode(await readBytes(context.request, MOST_BYTES));
  const setting = { networkId: network.id, userId: user.id, zone: settings.timeZone };
  return json(valueOf(await noteFile(setting, text)));
});
