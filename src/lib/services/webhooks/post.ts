import { request as requestHttp, type RequestOptions } from 'node:http';
import { request as requestHttps } from 'node:https';
import { guardedLookup, targetProblem } from './target';

/** What a receiver said; status null: it could not be reached. */
export interface PostOutcome {
  status: number | null;
  /** In words, for the log of deliveries. */
  words: string;
}

const TIMEOUT_MS = 10_000;

/**
 * Posts a body once. Redirects are not followed, the answer's body is not read, and after 10 s it is broken off. Never throws.
 */
export function postOnce(
  url: string,
  body: string,
  headers: Record<string, string>,
  mayLoopBack: boolean,
): Promise<PostOutcome> {
  const problem = targetProblem(url, mayLoopBack);
  if (problem) return Promise.resolve({ status: null, words: `Not sent: the address ${problem}.` });
  return new Promise((resolve) => {
    const request = url.startsWith('https:') ? requestHttps : requestHttp;
    const options: RequestOptions = {
      method: 'POST',
      headers: { ...headers, 'Content-Length': Buffer.byteLength(body) },
      lookup: guardedLookup(mayLoopBack) as RequestOptions['lookup'],
      agent: false,
      signal: AbortSignal.timeout(TIMEOUT_MS),
    };
    const sent = request(url, options, (response) => {
      const status = response.statusCode ?? 0;
      resolve({ status, words: `answered ${status}` });
      response.destroy();
    });
    sent.on('error', (error) => resolve({ status: null, words: reasonOf(error) }));
    sent.end(body);
  });
}

function reasonOf(error: Error): string {
  return error.name === 'AbortError' || error.name === 'TimeoutError'
    ? `no answer within ${TIMEOUT_MS / 1000} s`
    : `not reached: ${error.message}`;
}
