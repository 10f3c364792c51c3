import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { SUMMARY_FORMATS, type Summary, type SummaryFormat } from '#lib/contracts/summaries';
import { notFound } from '#lib/http/problem';
import { csv, download, json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthlySummary } from '#lib/services/summaries/monthlySummary';
import { summaryCsv } from '#lib/services/summaries/summaryCsv';
import { summaryPdf } from '#lib/services/summaries/summaryPdf';

const FILE = /^(\d{4}-(?:0[1-9]|1[0-2]))\.([a-z]+)$/;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const [, month = '', extension] = FILE.exec(context.params['file'] ?? '') ?? [];
  const format = SUMMARY_FORMATS.find((known) => known === extension);
  if (!format) {
    throw notFound(
      `A summary is a month and a format, such as 2026-03.pdf; formats: ${SUMMARY_FORMATS.join(', ')}.`,
    );
  }
  if (context.url.searchParams.has('revision')) {
    throw notFound('No revision has been issued for this month; without `revision` you get the draft.');
  }
  const summary = await monthlySummary(network, month, new Date());
  if (!summary) throw notFound('This month has not begun.');
  return fileOf(summary, format, `${network.slug}-${month}`);
});

async function fileOf(summary: Summary, format: SummaryFormat, name: string): Promise<Response> {
  if (format === 'json') return json(summary);
  if (format === 'csv') return csv(summaryCsv(summary), `${name}.csv`);
  return download(new Uint8Array(await summaryPdf(summary)), 'application/pdf', `${name}.pdf`);
}
