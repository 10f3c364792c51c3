import { parentPort } from 'node:worker_threads';
import { SearchRun } from './runSearch';
import { type FromThread, type ToThread } from './searchMessages';

/** The thread that searches, so that no page waits for it: one search at a time, as `threads.ts` sends them. */
const cancelled = new Set<number>();

parentPort?.on('message', (message: ToThread) => {
  if (message.kind === 'cancel') cancelled.add(message.id);
  else void search(message);
});

async function search({ id, task }: Extract<ToThread, { kind: 'search' }>): Promise<void> {
  const run = new SearchRun(task, {
    onProgress: (progress) => send({ kind: 'progress', id, progress }),
    isCancelled: () => cancelled.has(id),
  });
  try {
    send({ kind: 'result', id, result: await run.result() });
  } catch (error) {
    const { message, code } = error as Error & { code?: string };
    send({ kind: 'failed', id, message, code });
  }
  cancelled.delete(id);
}

function send(message: FromThread): void {
  parentPort?.postMessage(message);
}
