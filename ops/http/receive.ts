import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { Answer } from '#lib/http/answer';
import type { Chunks } from '#lib/http/monitorRequest';
import { problemAnswer } from '#lib/http/problem';
import { problemOf } from '#lib/http/route';
import { closeLingering } from './lingeringClose';
import { takePost } from '../../src/pages/api/v1/intervals/index';

/**
 * Hands a monitor's post from an address to its handler without Express and the pages' server in between, which would cost more than everything
 * else that a small post does. The answer is the same.
 */
export async function receivePost(
  request: IncomingMessage,
  response: ServerResponse,
  address: string,
): Promise<void> {
  const answer = await takePost(
    { headers: { get: (name) => headerOf(request, name) }, body: chunksOf(request) },
    address,
  ).catch((error: unknown) => problemAnswer(problemOf(error, '/api/v1/intervals')));
  write(answer, request, response);
}

function headerOf(request: IncomingMessage, name: string): string | null {
  const value = request.headers[name];
  return typeof value === 'string' ? value : null;
}

/** Node's events cost a small post a tenth of what its iterator does. */
function chunksOf(request: IncomingMessage): Chunks {
  return {
    forEach: (take) =>
      new Promise((resolve, reject) => {
        const broken = () => reject(new Error('The connection ended before the body did.'));
        if (request.destroyed) return broken();
        const onData = (chunk: Uint8Array) => {
          try {
            take(chunk);
          } catch (error) {
            request.off('data', onData).pause();
            reject(error);
          }
        };
        request.on('data', onData).on('end', resolve).on('error', reject).on('close', broken);
      }),
  };
}

function write({ status, headers, body }: Answer, request: IncomingMessage, response: ServerResponse): void {
  if (!request.complete) closeLingering(request);
  response.writeHead(status, {
    ...headers,
    // What was not read of the body is not waited for.
    ...(request.complete ? {} : { Connection: 'close' }),
    'Content-Length': Buffer.byteLength(body),
    'X-Content-Type-Options': 'nosniff',
    'X-Request-Id': randomUUID(),
  });
  response.end(body);
}
