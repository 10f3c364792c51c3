import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parseCount } from '#lib/http/parse';
import { notFound, Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthOf } from '#lib/http/summaryMonth';
import { issuedSummary } from '#lib/services/summaries/seal/files';
import { openManifest } from '#lib/services/summaries/seal/verify';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const month = monthOf(context.params['month']);
  const isGiven = context.url.searchParams.has('revision');
  const revision = isGiven ? parseCount(context.url, 'revision', { fallback: 1, most: 9999 }) : null;
  const issued = await issuedSummary(network.id, month, revision);
  if (!issued) throw notFound('No such revision has been issued.');
  const opened = await openManifest(issued.row);
  if (!opened) {
    throw new Problem(
      500,
      'seal-damaged',
      'The seal is damaged',
      'What is kept of the manifest does not fit its signature.',
    );
  }
  return json(opened.manifest);
});
