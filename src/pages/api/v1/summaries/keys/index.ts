import { notFound } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { publishedKeys } from '#lib/services/summaries/seal/published';

export const GET = route(async (context) => {
  const keys = await publishedKeys(context.url.searchParams.get('network') ?? '');
  if (!keys) throw notFound('No network of this name has signed a month.');
  return json({ items: keys });
});
