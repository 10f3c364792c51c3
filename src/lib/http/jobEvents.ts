import { type JobListener } from '#lib/services/threads/messages';
import { jobProblem, type JobKind } from './jobProblem';
import { problemOf } from './route';

const HEADERS = {
  'Content-Type': 'text/event-stream; charset=utf-8',
  // Nothing between here and the browser may hold events back to compress or to buffer them.
  'Cache-Control': 'no-store, no-transform',
  'X-Accel-Buffering': 'no',
  Connection: 'close',
};

/** Whether who asks would rather have events than the answer alone. */
export function wantsEvents(request: Request): boolean {
  return request.headers.get('accept')?.includes('text/event-stream') ?? false;
}

interface Told {
  kind: JobKind;
  /** Path that was asked for. */
  path: string;
}

/** Server-sent events of a job: `progress`, then `result`, or `problem` (problem details). Leaving cancels it. */
export function jobEvents(job: (listener: JobListener) => Promise<unknown>, { kind, path }: Told): Response {
  const left = new AbortController();
  const body = new ReadableStream<Uint8Array>({
    start: (controller) => {
      const encoder = new TextEncoder();
      const send = (name: string, data: unknown) => {
        if (left.signal.aborted) return;
        controller.enqueue(encoder.encode(`event: ${name}\ndata: ${JSON.stringify(data)}\n\n`));
      };
      const end = () => {
        if (!left.signal.aborted) controller.close();
      };
      const listener: JobListener = {
        signal: left.signal,
        onProgress: (progress) => send('progress', progress),
      };
      void job(listener).then(
        (answer) => {
          send('result', answer);
          end();
        },
        (error: unknown) => {
          if (left.signal.aborted) return;
          const { status, code, title, detail } = problemOf(jobProblem(error, kind), path);
          send('problem', { type: 'about:blank', status, code, title, detail });
          end();
        },
      );
    },
    cancel: () => left.abort(),
  });
  return new Response(body, { headers: HEADERS });
}
