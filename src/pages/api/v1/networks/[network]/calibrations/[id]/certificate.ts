import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { MOST_CERTIFICATE_BYTES } from '#lib/contracts/calibrations';
import { idOf, valueOf } from '#lib/http/outcome';
import { notFound } from '#lib/http/problem';
import { readBytes } from '#lib/http/readBytes';
import { download, json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addCertificate } from '#lib/services/calibrations/change';
import { certificateOf } from '#lib/services/calibrations/list';

const ENDINGS: Record<string, string> = {
  'application/pdf': 'pdf',
  'image/png': 'png',
  'image/jpeg': 'jpg',
};

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const file = await certificateOf(network.id, idOf(context.params.id));
  if (!file) throw notFound('This check has no certificate.');
  const answer = download(
    new Uint8Array(file.bytes),
    file.type,
    `${file.name}.${ENDINGS[file.type] ?? 'bin'}`,
  );
  answer.headers.set('X-Content-Type-Options', 'nosniff');
  answer.headers.set('Content-Security-Policy', "default-src 'none'; sandbox");
  return answer;
});

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const bytes = await readBytes(context.request, MOST_CERTIFICATE_BYTES);
  const act = { networkId: network.id, id: idOf(context.params.id), userId: user.id };
  return json({ calibration: valueOf(await addCertificate(act, bytes)) });
});
