import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { searchEvents } from '#lib/http/searchEvents';
import { parseSpectrumSearch, searchProblem } from '#lib/http/spectrumSearchQuery';
import { searchSpectrum } from '#lib/services/spectra/search';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const search = await parseSpectrumSearch(context.url, network.id, Math.floor(Date.now() / 1000));
  if (context.request.headers.get('accept')?.includes('text/event-stream')) {
    return searchEvents((listener) => searchSpectrum(search, listener), context.url.pathname);
  }
  try {
    return json(await searchSpectrum(search, { signal: context.request.signal }));
  } catch (error) {
    throw searchProblem(error);
  }
});
