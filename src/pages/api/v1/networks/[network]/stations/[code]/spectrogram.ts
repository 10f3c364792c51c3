import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { encodeSpectrogram } from '#lib/contracts/spectrogramBinary';
import { asOfHeader } from '#lib/http/asOf';
import { parseChoice, parseCount, parsePeriod } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { MOST_COLUMNS, USUAL_MOST_COLUMNS } from '#lib/services/levels/columnPlan';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { spectrogramJson } from '#lib/services/levels/spectrogramJson';
import { readHeavy } from '#lib/services/reading/readHeavy';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const period = parsePeriod(context.url);
  const mostColumns = parseCount(context.url, 'columns', {
    fallback: USUAL_MOST_COLUMNS,
    most: MOST_COLUMNS,
  });
  const percentiles = parseChoice(context.url, 'percentiles', ['none', 'A']) === 'A';
  const { answer: columns, dataAsOf } = await readHeavy(() =>
    spectrogram({ station, ...period, mostColumns, percentiles }),
  );
  const headers = { Vary: 'Accept', ...asOfHeader(dataAsOf) };
  const wantsBytes = (context.request.headers.get('accept') ?? '').includes('application/octet-stream');
  if (!wantsBytes) return json(spectrogramJson(columns), { headers });
  return new Response(encodeSpectrogram(columns), {
    headers: { 'Content-Type': 'application/octet-stream', 'Cache-Control': 'no-store', ...headers },
  });
});
