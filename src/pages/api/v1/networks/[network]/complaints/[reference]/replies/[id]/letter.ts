import { requireNetwork } from '#lib/auth/guards';
import { notFound } from '#lib/http/problem';
import { pdfToRead } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { letterOf } from '#lib/services/complaints/deliverReply';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['liaison']);
  const { reference = '', id = '' } = context.params;
  const pdf = await letterOf({ userId: user.id, network, reference, replyId: Number(id) || 0 });
  if (!pdf) throw notFound('There is no such letter, or its personal data have been erased.');
  return pdfToRead(pdf, `${reference}.pdf`);
});
