import { SMTPServer } from 'smtp-server';
import type { MailStore } from './store';

/** How the mail server behaves, for trying what happens when it does not work. */
export const BEHAVIOURS = ['normal', 'refuse', 'slow', 'drop-after-data'] as const;
export type Behaviour = (typeof BEHAVIOURS)[number];

const MOST_BYTES = 25 * 1024 * 1024;
const SLOW_MS = 8000;

/** Takes mail from anybody on loopback and keeps it. `behaviour` is asked at each message. */
export function smtpServer(store: MailStore, behaviour: () => Behaviour): SMTPServer {
  return new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    size: MOST_BYTES,
    onMailFrom(_address, _session, answer) {
      if (behaviour() === 'refuse') answer(busy());
      else answer();
    },
    onData(stream, session, answer) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        const recipients = session.envelope.rcptTo.map(({ address }) => address);
        const kept = store.add(Buffer.concat(chunks), recipients);
        kept.then(() => acknowledge(behaviour(), answer), answer);
      });
    },
  });
}

function acknowledge(behaviour: Behaviour, answer: (error?: Error | null) => void): void {
  if (behaviour === 'slow') setTimeout(answer, SLOW_MS);
  // 421: the line is closed. The message was taken, and its sender cannot know.
  else if (behaviour === 'drop-after-data')
    answer(Object.assign(new Error('Line dropped'), { responseCode: 421 }));
  else answer();
}

function busy(): Error {
  return Object.assign(new Error('Not now, try again later'), { responseCode: 451 });
}
