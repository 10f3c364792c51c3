import { type SpectrumSearchAnswer } from '#lib/contracts/spectrumSearch';
import { type SearchListener } from '#lib/services/spectra/threads';
import { problemOf } from './route';
import { searchProblem } from './spectrumSearchQuery';

type Search = (listener: SearchListener) => Promise<SpectrumSearchAnswer>;

const HEADERS = {
  'Content-Type': 'text/event-stream; charset=utf-8',
  // Nothing between here and the browser may hold events back to compress or to buffer them.
  'Cache-Control': 'no-store, no-transform',
  'X-Accel-Buffering': 'no',
  Connection: 'close',
};

/** Server-sent events of a search: `progress`, then `result`, or `problem` (problem details). Leaving cancels it. */
export function searchEvents(search: Search, path: string): Response {
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
      const watch = { signal: left.signal, onProgress: (progress: unknown) => send('progress', progress) };
      void search(watch).then(
        (answer) => {
          send('result', answer);
          end();
        },
        (error: unknown) => {
          if (left.signal.aborted) return;
          const { status, code, title, detail } = problemOf(searchProblem(error), path);
          send('problem', { type: 'about:blank', status, code, title, detail });
          end();
        },
      );
    },
    cancel: () => left.abort(),
  });
  return new Response(body, { headers: HEADERS });
}
