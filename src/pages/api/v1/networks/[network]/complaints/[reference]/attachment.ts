import { requireNetwork } from '#lib/auth/guards';
import { notFound } from '#lib/http/problem';
import { download } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { readAttachment } from '#lib/services/reports/residentPart';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['liaison']);
  const file = await readAttachment(user.id, network.id, context.params.reference ?? '');
  if (!file) throw notFound('This complaint has no file.');
  // Never shown in the browser: what strangers send is saved, not run.
  const answer = download(new Uint8Array(file.bytes), 'application/octet-stream', file.name);
  answer.headers.set('X-Content-Type-Options', 'nosniff');
  answer.headers.set('Content-Security-Policy', "default-src 'none'; sandbox");
  answer.headers.set('Cache-Control', 'private, no-store');
  return answer;
});
