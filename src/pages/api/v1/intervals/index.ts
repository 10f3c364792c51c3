import { ShiftUnderWay } from '#ingest/receive/clockRules';
import { readEnvelope, UnreadablePost } from '#ingest/receive/envelope';
import { receiveBatch } from '#ingest/receive/receive';
import { requireStationToken, sentStationToken } from '#lib/auth/guards';
import { HeldBytes } from '#lib/http/heldBytes';
import { inTime } from '#lib/http/inTime';
import { monitorRequestOf, type MonitorRequest } from '#lib/http/monitorRequest';
import { Problem } from '#lib/http/problem';
import { readMonitorBody, textOfBody, type MonitorBody } from '#lib/http/readMonitorBody';
import { receivingGate } from '#lib/http/receivingGate';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(({ request, clientAddress }) => takePost(monitorRequestOf(request), clientAddress));

/**
 * Takes what a monitor posts from an address; the HTTP front calls it directly. The body is read before its turn comes, so that a
 * slow line keeps nobody waiting, and inflated and stored in it.
 */
export async function takePost(request: MonitorRequest, address: string): Promise<Response> {
  const secret = sentStationToken(request);
  const gate = receivingGate();
  return gate.enter({ address, secret }, async (takeTurn) => {
    const station = await inTime(requireStationToken(request));
    gate.noteKnown(secret);
    const held = new HeldBytes();
    try {
      const body = await readMonitorBody(request, held);
      return await inTime(takeTurn(() => receive(station, body)));
    } finally {
      held.release();
    }
  });
}

async function receive(station: Parameters<typeof receiveBatch>[0], body: MonitorBody): Promise<Response> {
  try {
    const envelope = readEnvelope(await textOfBody(body), station.bandFraction);
    return json(await receiveBatch(station, envelope, new Date()));
  } catch (error) {
    throw refusalOf(error);
  }
}

function refusalOf(error: unknown): unknown {
  if (error instanceof UnreadablePost) return problemOf(error);
  if (!(error instanceof ShiftUnderWay)) return error;
  const headers = { 'Retry-After': '20' };
  return new Problem(503, 'clock-shift-under-way', 'Not possible at the moment', error.message, { headers });
}

function problemOf({ kind, detail }: UnreadablePost): Problem {
  return kind === 'too-large'
    ? new Problem(413, 'too-large', 'Too large', detail)
    : new Problem(422, 'unreadable', 'No intervals could be read', detail);
}
