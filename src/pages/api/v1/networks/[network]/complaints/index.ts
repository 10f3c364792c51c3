import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { COMPLAINT_STATUSES, newComplaintSchema, type ComplaintStatus } from '#lib/contracts/complaints';
import { badRequest, invalidFields } from '#lib/http/problem';
import { makeCursor, parseCount, parseCursor, parsePeriod, readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { listCases } from '#lib/services/complaints/listCases';
import { logComplaint } from '#lib/services/complaints/logComplaint';
import { findView } from '#lib/services/complaints/openCase';

export const GET = route(async (context) => {
  const { network, settings } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const { url } = context;
  const hasPeriod = url.searchParams.has('from') || url.searchParams.has('to');
  const filter = {
    ...(hasPeriod ? parsePeriod(url) : {}),
    status: parseStatus(url),
    limit: parseCount(url, 'limit', { fallback: 100, most: 1000 }),
    cursor: parseCursor(url),
  };
  const { items, next } = await listCases(network, settings, filter, new Date());
  return json({ items, next: next && makeCursor(next) });
});

export const POST = route(async (context) => {
  const { user, network, settings } = await requireNetwork(context, context.params['network'], ['liaison']);
  const complaint = await readJson(context.request, newComplaintSchema);
  const outcome = await logComplaint({ userId: user.id, network, settings }, complaint, new Date());
  if (outcome.kind === 'invalid') throw invalidFields([outcome]);
  const view = await findView(network, settings, outcome.reference, new Date());
  const location = `/api/v1/networks/${network.slug}/complaints/${outcome.reference}`;
  return json({ complaint: view }, { status: 201, headers: { Location: location } });
});

function parseStatus(url: URL): ComplaintStatus | undefined {
  const text = url.searchParams.get('status');
  const status = COMPLAINT_STATUSES.find((known) => known === text);
  if (text !== null && !status)
    throw badRequest(`\`status\` must be one of ${COMPLAINT_STATUSES.join(', ')}.`);
  return status;
}
