import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { asOfHeader } from '#lib/http/asOf';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { jobProblem } from '#lib/http/jobProblem';
import { parseSpectrumSearch } from '#lib/http/spectrumSearchQuery';
import { spellsCsv } from '#lib/services/spectra/spellsCsv';
import { searchSpectrum } from '#lib/services/spectra/search';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const search = await parseSpectrumSearch(context.url, network.id, Math.floor(Date.now() / 1000));
  try {
    const answer = await searchSpectrum(search, { signal: context.request.signal });
    const asOf = answer.dataAsOf === null ? null : new Date(answer.dataAsOf);
    return csv(spellsCsv(answer), `${network.slug}-spectrum-search.csv`, asOfHeader(asOf));
  } catch (error) {
    throw jobProblem(error, 'search');
  }
});
