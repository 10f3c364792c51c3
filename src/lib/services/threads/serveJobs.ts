import { parentPort } from 'node:worker_threads';
import { type FromThread, type JobWatch, type ToThread } from './messages';

/** Does in this thread what `JobThread` sends, one job at a time: no page waits for it. */
export function serveJobs<Task, Result>(run: (task: Task, watch: JobWatch) => Promise<Result>): void {
  const cancelled = new Set<number>();
  const send = (message: FromThread<Result>) => parentPort?.postMessage(message);
  const work = async (id: number, task: Task) => {
    try {
      const watch: JobWatch = {
        onProgress: (progress) => send({ kind: 'progress', id, progress }),
        isCancelled: () => cancelled.has(id),
      };
      send({ kind: 'result', id, result: await run(task, watch) });
    } catch (error) {
      const { message, code } = error as Error & { code?: string };
      send({ kind: 'failed', id, message, code });
    }
    cancelled.delete(id);
  };
  parentPort?.on('message', (message: ToThread<Task>) => {
    if (message.kind === 'cancel') cancelled.add(message.id);
    else void work(message.id, message.task);
  });
}
