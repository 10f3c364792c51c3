import { ShiftUnderWay } from '#ingest/receive/clockRules';
import { readPost, UnreadablePost } from '#ingest/receive/envelope';
import { receiveBatch, StaleStation } from '#ingest/receive/receive';
import { requireStationToken, sentStationToken, type TokenStation } from '#lib/auth/guards';
import { responseOf, type Answer } from '#lib/http/answer';
import { HeldBytes } from '#lib/http/heldBytes';
import { inTime } from '#lib/http/inTime';
import { monitorRequestOf, type MonitorRequest } from '#lib/http/monitorRequest';
import { Problem } from '#lib/http/problem';
import { bytesOfBody, isSmallBody, readMonitorBody, type MonitorBody } from '#lib/http/readMonitorBody';
import { receivingGate } from '#lib/http/receivingGate';
import { jsonAnswer } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async ({ request, clientAddress }) =>
  responseOf(await takePost(monitorRequestOf(request), clientAddress)),
);

/** Of a turn, for a small post: it costs little time and memory, and several can share a transaction. */
const SMALL_PART = 1 / 4;

/**
 * Takes what a monitor posts from an address; the HTTP front calls it directly. The body is read before its turn comes, so that a
 * slow line keeps nobody waiting, and inflated and stored in it.
 */
export async function takePost(request: MonitorRequest, address: string): Promise<Answer> {
  const secret = sentStationToken(request);
  return receivingGate().enter({ address, secret }, async (takeTurn) => {
    const remembered = receivingGate().recall(secret);
    const station = remembered ?? (await askForStation(request, secret));
    const held = new HeldBytes();
    try {
      const body = await readMonitorBody(request, held);
      return await inTime(
        takeTurn(
          () => receive(body, station, remembered).catch(onceMore(request, secret, body)),
          isSmallBody(body) ? SMALL_PART : 1,
        ),
      );
    } finally {
      held.release();
    }
  });
}

async function askForStation(request: MonitorRequest, secret: string): Promise<TokenStation> {
  const station = await inTime(requireStationToken(request));
  receivingGate().remember(secret, station);
  return station;
}

/** Where what was remembered is no longer so, asks anew: the token may have ended. */
function onceMore(request: MonitorRequest, secret: string, body: MonitorBody) {
  return async (error: unknown): Promise<Answer> => {
    if (!(error instanceof StaleStation)) throw error;
    receivingGate().forget(secret);
    return receive(body, await askForStation(request, secret), null);
  };
}

async function receive(
  body: MonitorBody,
  station: TokenStation,
  remembered: TokenStation | null,
): Promise<Answer> {
  try {
    const envelope = await readPost(await bytesOfBody(body), station.bandFraction);
    return jsonAnswer(await receiveBatch(station, envelope, new Date(), remembered));
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
