import { badRequest } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { digestOf } from '#lib/http/digest';
import { verifyDigest } from '#lib/services/summaries/seal/verify';

export const GET = route(async (context) => {
  const digest = digestOf(context.url.searchParams.get('sha256'));
  if (!digest) throw badRequest('`sha256` must be 64 hexadecimal digits.');
  return json(await verifyDigest(digest));
});
