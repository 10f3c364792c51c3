import { config } from '#lib/config/index';
import { requireOperationsAccess } from '#lib/http/operationsAccess';
import { route } from '#lib/http/route';
import { metricsText } from '#lib/services/operation/metrics';

/** OpenMetrics for a scraper on loopback or with the metrics token. */
export const GET = route(async ({ request, clientAddress }) => {
  requireOperationsAccess(request, clientAddress, config().metricsToken);
  return new Response(await metricsText(new Date()), {
    headers: { 'Content-Type': 'application/openmetrics-text; version=1.0.0; charset=utf-8' },
  });
});
