import { requireNetwork } from '#lib/auth/guards';
import { notFound, Problem } from '#lib/http/problem';
import { pdfToRead } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { previewPdf } from '#lib/services/complaints/answer/previewPdf';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['liaison']);
  const reference = context.params['reference'] ?? '';
  const preview = await previewPdf(user.id, network, reference, new Date());
  if (!preview) throw notFound('No answer to this report is being written.');
  if (preview.kind === 'refused') {
    throw new Problem(409, 'text-refused', 'The letter cannot be sent like this', preview.message);
  }
  return pdfToRead(preview.pdf, `${reference}-preview.pdf`);
});
