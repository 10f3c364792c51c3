import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { SUMMARY_FORMATS } from '#lib/contracts/summaries';
import { badRequest, notFound } from '#lib/http/problem';
import { download } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthOf } from '#lib/http/summaryMonth';
import { archiveOf } from '#lib/services/summaries/desk/archive';

const MOST_MONTHS = 60;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const { searchParams } = context.url;
  const months = [...new Set(searchParams.getAll('month'))].map(monthOf);
  const formats = searchParams.getAll('format');
  if (months.length === 0 || months.length > MOST_MONTHS) {
    throw badRequest(`\`month\` must be given from 1 to ${MOST_MONTHS} times.`);
  }
  if (formats.some((format) => !SUMMARY_FORMATS.some((known) => known === format))) {
    throw badRequest(`\`format\` must be one of ${SUMMARY_FORMATS.join(', ')}.`);
  }
  const archive = await archiveOf(network, months, formats.length > 0 ? formats : null);
  if (!archive) throw notFound('None of these months has been issued.');
  return download(archive, 'application/zip', `${network.slug}-summaries.zip`);
});
