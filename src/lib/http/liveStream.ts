import { LIVE_EVENT, LIVE_OVER_EVENT } from '#lib/contracts/liveEvents';
import { listen, type NoRoom } from '#lib/services/live/listeners';
import { Problem } from './problem';

interface LiveStream {
  networkId: number;
  userId: string;
  /** Whether the listener may still hear this network: asked again and again while the stream is open. */
  mayListen: () => Promise<boolean>;
  /** How often it is asked and a sign of life goes out. */
  checkEveryMs?: number;
}

const CHECK_EVERY_MS = 15_000;
/** Messages that may wait for a listener who does not read. */
const MOST_WAITING = 64;
const RETRY_AFTER_SEC = 30;

const HEADERS = {
  'Content-Type': 'text/event-stream; charset=utf-8',
  // Nothing between here and the browser may hold events back to compress or to buffer them.
  'Cache-Control': 'no-store, no-transform',
  'X-Accel-Buffering': 'no',
  // A server that drains does not wait for the connection to be used again.
  Connection: 'close',
};

/**
 * Server-sent events of what a network's stations measure, until the browser leaves, the person may not listen any longer, or
 * the process ends.
 * @throws {Problem} 429 or 503 when there are too many listeners, of this person or of all
 */
export function liveStream(asked: LiveStream): Response {
  let leave: () => void = () => undefined;
  const body = new ReadableStream<Uint8Array>(
    {
      start: (controller) => {
        leave = begin(controller, asked);
      },
      cancel: () => leave(),
    },
    { highWaterMark: MOST_WAITING },
  );
  return new Response(body, { headers: HEADERS });
}

/** Begins to send and answers what stops it. */
function begin(controller: ReadableStreamDefaultController<Uint8Array>, asked: LiveStream): () => void {
  const { networkId, userId, mayListen, checkEveryMs = CHECK_EVERY_MS } = asked;
  const encoder = new TextEncoder();
  let isOpen = true;
  const send = (text: string) => {
    if (!isOpen) return;
    if ((controller.desiredSize ?? 0) <= 0) return end();
    controller.enqueue(encoder.encode(text));
  };
  const unlisten = listen({
    networkId,
    userId,
    tell: (intervals) => send(intervals.map((one) => eventText(LIVE_EVENT, one)).join('')),
    end: () => end(),
  });
  if (typeof unlisten === 'string') throw noRoom(unlisten);
  const check = setInterval(() => void stayOrEnd(), checkEveryMs).unref();
  const stop = () => {
    isOpen = false;
    clearInterval(check);
    unlisten();
  };
  const end = () => {
    if (!isOpen) return;
    stop();
    controller.close();
  };
  const stayOrEnd = async () => {
    // Where that cannot be found out now, nothing can be told either: the next check decides.
    const may = await mayListen().catch(() => true);
    send(may ? ': still here\n\n' : eventText(LIVE_OVER_EVENT, {}));
    if (!may) end();
  };
  send('retry: 5000\n\n');
  return stop;
}

/** One server-sent event with JSON as its data. */
function eventText(name: string, data: unknown): string {
  return `event: ${name}\ndata: ${JSON.stringify(data)}\n\n`;
}

function noRoom(reason: NoRoom): Problem {
  const [status, title] =
    reason === 'person-full'
      ? [429, 'You are listening in too many places at once']
      : [503, 'Too many are listening at the moment'];
  const detail = 'Ask for the stations from time to time instead, or try again later.';
  return new Problem(status, 'too-many-listeners', title, detail, {
    headers: { 'Retry-After': String(RETRY_AFTER_SEC) },
  });
}
