import { randomUUID } from 'node:crypto';
import type { Request, RequestHandler, Response } from 'express';
import type { Answer } from '#lib/http/answer';
import { problemAnswer } from '#lib/http/problem';
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
  ).catch((error: unknown) => problemAnswer(problemOf(error, request.path)));
  // What was not read of the body is not waited for.
  if (!request.complete) response.set('Connection', 'close');
  write(answer, response);
};

function headerOf(request: Request, name: string): string | null {
  const value = request.headers[name];
  return typeof value === 'string' ? value : null;
}

function write({ status, headers, body }: Answer, response: Response): void {
  response.writeHead(status, {
    ...headers,
    'Content-Length': Buffer.byteLength(body),
    'X-Content-Type-Options': 'nosniff',
    'X-Request-Id': randomUUID(),
  });
  response.end(body);
}
