import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import type { APIContext } from 'astro';
import { config } from '#lib/config/index';
import { POST } from '../../../../src/pages/api/v1/intervals/index';

/**
 * The web's stand-in where it has not been built: the very route of `POST /api/v1/intervals`, without the front and the pages'
 * server around it. Listens where the settings say.
 */
const { host, port, origin } = config();
createServer((incoming, outgoing) => {
  if (incoming.url === '/healthz') outgoing.end();
  else answer(incoming, outgoing).catch(() => outgoing.destroy());
}).listen(port, host);
process.on('SIGTERM', () => process.exit(0));

async function answer(incoming: IncomingMessage, outgoing: ServerResponse): Promise<void> {
  const url = new URL(incoming.url ?? '/', origin);
  const request = new Request(url, {
    method: 'POST',
    headers: incoming.headers as Record<string, string>,
    body: Readable.toWeb(incoming) as ReadableStream<Uint8Array>,
    duplex: 'half',
  } as RequestInit);
  const response = await POST({ request, url } as APIContext);
  outgoing.writeHead(response.status, Object.fromEntries(response.headers));
  outgoing.end(await response.text());
}
