import { randomUUID } from 'node:crypto';
import type { APIContext, MiddlewareNext } from 'astro';
import { defineMiddleware } from 'astro:middleware';
import { actingFrom } from '#lib/auth/actingFrom';
import { userOfRequest } from '#lib/auth/requestUser';
import { noteRefusal } from '#lib/http/noteRefusal';
import { problemResponse } from '#lib/http/problem';
import { problemOf } from '#lib/http/route';
import { requireSameOrigin } from '#lib/http/sameOrigin';
import { chosenTheme } from '#lib/http/themeCookie';

const HEADERS = {
  'X-Content-Type-Options': 'nosniff',
  'Referrer-Policy': 'same-origin',
  'X-Frame-Options': 'DENY',
  'Cross-Origin-Opener-Policy': 'same-origin',
  // A resident may have the form find the place; files are chosen, never filmed.
  'Permissions-Policy':
    'camera=(), display-capture=(), geolocation=(self), microphone=(), midi=(), payment=(), usb=()',
};

/** Every request: own-origin check, who is asking, and the headers that every answer carries. */
export const onRequest = defineMiddleware(async (context, next) => {
  context.locals.requestId = randomUUID();
  context.locals.theme = chosenTheme(context.cookies);
  const response = await answer(context, next);
  const { requestId, user } = context.locals;
  const { method } = context.request;
  noteRefusal(response.status, { requestId, method, path: context.url.pathname, userId: user?.id ?? null });
  return withHeaders(response, requestId);
});

async function answer(context: APIContext, next: MiddlewareNext): Promise<Response> {
  try {
    requireSameOrigin(context.request);
    context.locals.user = await userOfRequest(context);
  } catch (error) {
    return refusal(error, context.url.pathname);
  }
  return actingFrom(context.clientAddress, next);
}

function refusal(error: unknown, path: string): Response {
  const problem = problemOf(error, path);
  if (path.startsWith('/api/')) return problemResponse(problem);
  const text = `${problem.title}. ${problem.detail ?? ''}\n`;
  return new Response(text, {
    status: problem.status,
    headers: { 'Content-Type': 'text/plain; charset=utf-8', ...problem.extra.headers },
  });
}

function withHeaders(response: Response, requestId: string): Response {
  // A page may be stricter than all of them.
  for (const [name, value] of Object.entries(HEADERS)) {
    if (!response.headers.has(name)) response.headers.set(name, value);
  }
  if (response.headers.get('Content-Type') === 'text/html') {
    response.headers.set('Content-Type', 'text/html; charset=utf-8');
  }
  response.headers.set('X-Request-Id', requestId);
  if (!response.headers.has('Cache-Control')) response.headers.set('Cache-Control', 'private, no-cache');
  return response;
}
