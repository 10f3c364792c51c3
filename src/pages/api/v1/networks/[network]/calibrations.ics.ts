import { requireFeed } from '#lib/auth/feed';
import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { config } from '#lib/config/index';
import { download } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { dueCalendar } from '#lib/services/calibrations/calendar';
import { dueChecks } from '#lib/services/calibrations/due';

export const GET = route(async (context) => {
  const { network, settings } = context.locals.user
    ? await requireNetwork(context, context.params.network, ALL_ROLES)
    : await requireFeed(context.url, context.params.network, 'calendar');
  const now = new Date();
  const due = await dueChecks(network.id, settings.timeZone, Math.floor(now.getTime() / 1000));
  const { origin } = config();
  const calendar = dueCalendar(due, {
    networkName: network.name,
    instrumentsUrl: `${origin}/n/${network.slug}/instruments`,
    host: new URL(origin).hostname,
    now,
  });
  return download(calendar, 'text/calendar; charset=utf-8', `${network.slug}-calibrations.ics`);
});
