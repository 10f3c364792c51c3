import type { Socket } from 'node:net';
import { SMTPServer, type SMTPServerDataStream } from 'smtp-server';
import type { MailStore } from './store';

/** How the mail server behaves, for trying what happens when it does not work. */
export const BEHAVIOURS = ['normal', 'refuse', 'slow', 'drop-after-data'] as const;
export type Behaviour = (typeof BEHAVIOURS)[number];

const MOST_BYTES = 25 * 1024 * 1024;
const SLOW_MS = 8000;
const CLOSE_WITHIN_MS = 1000;

/** Takes mail from anybody on loopback and keeps it. `behaviour` is asked at each message. */
export function smtpServer(store: MailStore, behaviour: () => Behaviour): SMTPServer {
  const sockets = new Map<number, Socket>();
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    size: MOST_BYTES,
    closeTimeout: CLOSE_WITHIN_MS,
    onMailFrom(_address, _session, answer) {
      if (behaviour() === 'refuse') answer(problem(451, 'Not now, try again later'));
      else answer();
    },
    onData(stream, session, answer) {
      const acknowledge = () => {
        const mode = behaviour();
        if (mode === 'slow') setTimeout(answer, SLOW_MS).unref();
        // The message was taken, and its sender cannot know: the line goes dead without an answer.
        else if (mode === 'drop-after-data') sockets.get(session.remotePort)?.destroy();
        else answer();
      };
      readAll(stream)
        .then((source) =>
          store.add(
            source,
            session.envelope.rcptTo.map(({ address }) => address),
          ),
        )
        .then(acknowledge, answer);
    },
  });
  server.server.on('connection', (socket: Socket) => {
    const port = socket.remotePort ?? 0;
    sockets.set(port, socket);
    socket.once('close', () => sockets.delete(port));
  });
  return server;
}

/** Collects a message. Too large a one is read to its end, as SMTP wants it, but not kept in memory. */
async function readAll(stream: SMTPServerDataStream): Promise<Buffer> {
  const chunks: Buffer[] = [];
  for await (const chunk of stream as AsyncIterable<Buffer>) if (!stream.sizeExceeded) chunks.push(chunk);
  if (stream.sizeExceeded) throw problem(552, `A message may have at most ${MOST_BYTES} bytes`);
  return Buffer.concat(chunks);
}

function problem(responseCode: number, words: string): Error {
  return Object.assign(new Error(words), { responseCode });
}
