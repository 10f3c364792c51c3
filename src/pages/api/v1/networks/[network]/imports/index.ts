import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import { openImport } from '#ingest/imports/open';
import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { uploadProblem } from '#lib/http/importOutcome';
import { makeCursor, parseCount, parseCursor } from '#lib/http/parse';
import { Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { importPage } from '#lib/services/imports/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const code = context.url.searchParams.get('station');
  const station = code === null ? null : await requireStation(network.id, code);
  const { items, next } = await importPage({
    networkId: network.id,
    stationId: station?.id ?? null,
    limit: parseCount(context.url, 'limit', { fallback: 100, most: 1000 }),
    cursor: parseCursor(context.url),
  });
  return json({ items, next: next && makeCursor(next) });
});

export const POST = route(async (context) => {
  const { network, settings, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { searchParams } = context.url;
  const station = await requireStation(network.id, searchParams.get('station') ?? '');
  const { body, headers } = context.request;
  if (!/^text\/csv\s*(;|$)/i.test(headers.get('content-type') ?? '')) {
    throw new Problem(415, 'wrong-type', 'Wrong content type', 'Send CSV with Content-Type: text/csv.');
  }
  const upload = {
    networkId: network.id,
    station,
    userId: user.id,
    fileName: searchParams.get('name') ?? '',
    zone: settings.timeZone,
  };
  try {
    const opened = await openImport(upload, bodyOf(body));
    const location = `/api/v1/networks/${network.slug}/imports/${opened.id}`;
    return json({ import: opened }, { status: 201, headers: { Location: location } });
  } catch (error) {
    throw uploadProblem(error);
  }
});

function bodyOf(body: Request['body']): AsyncIterable<Uint8Array> {
  return body ? Readable.fromWeb(body as ReadableStream<Uint8Array>) : Readable.from([]);
}
