import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { jobEvents, wantsEvents } from '#lib/http/jobEvents';
import { jobProblem } from '#lib/http/jobProblem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { parseSpectrumSearch } from '#lib/http/spectrumSearchQuery';
import { searchSpectrum } from '#lib/services/spectra/search';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const search = await parseSpectrumSearch(context.url, network.id, Math.floor(Date.now() / 1000));
  if (wantsEvents(context.request)) {
    const told = { kind: 'search', path: context.url.pathname } as const;
    return jobEvents((listener) => searchSpectrum(search, listener), told);
  }
  try {
    return json(await searchSpectrum(search, { signal: context.request.signal }));
  } catch (error) {
    throw jobProblem(error, 'search');
  }
});
