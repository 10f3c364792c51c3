import { randomUUID } from 'node:crypto';
import type { Request, RequestHandler, Response } from 'express';
import { problemResponse } from '#lib/http/problem';
import { problemOf } from '#lib/http/route';
import { takePost } from '../../src/pages/api/v1/intervals/index';

/**
 * Hands a monitor's post to its handler without the pages' server in between, which would cost more than everything else that a
 * small post does. The answer is the same.
 */
export const receivePost: RequestHandler = async (request, response) => {
  const answer = await takePost(
    {
      headers: { get: (name) => headerOf(request, name) },
      body: request.iterator({ destroyOnReturn: false }),
    },
    request.ip ?? '',
  ).catch((error: unknown) => problemResponse(problemOf(error, request.path)));
  // What was not read of the body is not waited for.
  if (!request.complete) response.set('Connection', 'close');
  await write(answer, response);
};

function headerOf(request: Request, name: string): string | null {
  const value = request.headers[name];
  return typeof value === 'string' ? value : null;
}

async function write(answer: globalThis.Response, response: Response): Promise<void> {
  const text = await answer.text();
  response.writeHead(answer.status, {
    ...Object.fromEntries(answer.headers),
    'Content-Length': Buffer.byteLength(text),
    'X-Content-Type-Options': 'nosniff',
    'X-Request-Id': randomUUID(),
  });
  response.end(text);
}
