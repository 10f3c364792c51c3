import { createServer, type IncomingMessage, type Server } from 'node:http';
import { type AddressInfo } from 'node:net';
import { readEnvelope } from '#ingest/receive/envelope';
import { receiveBatch } from '#ingest/receive/receive';
import { requireStationToken } from '#lib/auth/guards';
import { readMonitorBody } from '#lib/http/readMonitorBody';

/** A receiver on loopback that does what `POST /api/v1/intervals` does, without the pages' server around it. */
export class Receiver {
  readonly #server: Server;
  readonly #url: string;

  private constructor(server: Server) {
    this.#server = server;
    this.#url = `http://127.0.0.1:${(server.address() as AddressInfo).port}/api/v1/intervals`;
  }

  static async start(): Promise<Receiver> {
    const server = createServer((incoming, outgoing) => {
      answer(incoming).then(
        (receipt) => outgoing.end(receipt),
        (error: unknown) => outgoing.writeHead(500).end(String(error)),
      );
    });
    await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
    return new Receiver(server);
  }

  /** Posts packed intervals as a monitor does. @throws unless all of them are accepted. */
  async post(token: string, body: Uint8Array<ArrayBuffer>, count: number): Promise<void> {
    const response = await fetch(this.#url, {
      method: 'POST',
      headers: {
        authorization: `Bearer ${token}`,
        'content-type': 'application/json',
        'content-encoding': 'gzip',
      },
      body,
    });
    const text = await response.text();
    if (!text.startsWith(`{"accepted":${count},`))
      throw new Error(`Not all were accepted: ${text.slice(0, 300)}`);
  }

  stop(): void {
    this.#server.close();
    this.#server.closeAllConnections();
  }
}

async function answer(incoming: IncomingMessage): Promise<string> {
  const chunks: Buffer[] = [];
  for await (const chunk of incoming) chunks.push(chunk as Buffer);
  const request = new Request('http://127.0.0.1/api/v1/intervals', {
    method: 'POST',
    headers: incoming.headers as Record<string, string>,
    body: Buffer.concat(chunks),
  });
  const station = await requireStationToken(request);
  const envelope = readEnvelope(await readMonitorBody(request), station.bandFraction);
  return JSON.stringify(await receiveBatch(station, envelope, new Date()));
}
