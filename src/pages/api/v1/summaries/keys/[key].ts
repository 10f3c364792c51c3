import { digestOf } from '#lib/http/digest';
import { notFound } from '#lib/http/problem';
import { download } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { publishedKey } from '#lib/services/summaries/seal/published';

export const GET = route(async (context) => {
  const sha256 = digestOf(context.params['key']?.replace(/\.pem$/, ''));
  const key = sha256 && (await publishedKey(sha256));
  if (!key) throw notFound('There is no such key.');
  return download(key.pem, 'application/x-pem-file', `${key.sha256.slice(0, 16)}.pem`);
});
