import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { notFound } from '#lib/http/problem';
import { route } from '#lib/http/route';
import { readMark, summarySettings } from '#lib/services/summaries/template/settings';

/** The network's mark, as a picture. */
export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const mark = await readMark((await summarySettings(network.id)).mark);
  if (!mark) throw notFound('The network has no mark.');
  return new Response(new Uint8Array(mark.bytes), {
    headers: {
      'Content-Type': mark.mediaType,
      'Cache-Control': 'private, no-cache',
      'X-Content-Type-Options': 'nosniff',
      'Content-Security-Policy': "default-src 'none'; sandbox",
    },
  });
});
