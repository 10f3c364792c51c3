import type { IncomingMessage, RequestListener, ServerResponse } from 'node:http';
import { problemAnswer, Problem } from '#lib/http/problem';
import { closeLingering } from './lingeringClose';

const RETRY_AFTER_SEC = 15;

/** Open once the schema is as it must be. */
export interface Gate {
  isOpen: boolean;
}

/**
 * Answers for the front while the database is brought up to date, or is not there yet at the start, without asking it anything: people a
 * plain page, programs and monitors 503 with Retry-After, so that monitors keep what they have.
 */
export function behindGate(front: RequestListener, gate: Gate): RequestListener {
  return (request, response) => {
    if (gate.isOpen) front(request, response);
    else answerMeanwhile(request, response);
  };
}

function answerMeanwhile(request: IncomingMessage, response: ServerResponse): void {
  const path = (request.url ?? '/').split('?')[0] ?? '/';
  if (path === '/healthz') return write(request, response, 200, 'application/json', '{"status":"ok"}');
  if (path === '/readyz') return write(request, response, 503, 'application/json', JSON.stringify(NOT_READY));
  if (path.startsWith('/api/')) {
    const { body } = problemAnswer(BEING_UPDATED);
    return write(request, response, 503, 'application/problem+json', body);
  }
  write(request, response, 503, 'text/html; charset=utf-8', PAGE);
}

const NOT_READY = {
  database: 'away',
  worker: { lastTick: null },
  dirtyQuarters: null,
  outboxOldestSeconds: null,
  migrations: 'pending',
};

const BEING_UPDATED = new Problem(
  503,
  'being-updated',
  'Not possible at the moment',
  'Bittern is being brought up to date. Keep what you have and try again.',
);

const PAGE = `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width">
<meta name="color-scheme" content="light dark">
<meta http-equiv="refresh" content="${RETRY_AFTER_SEC}">
<title>Being brought up to date · Bittern</title>
</head>
<body>
<main>
<h1>Bittern is being brought up to date</h1>
<p>This page tries again by itself every ${RETRY_AFTER_SEC} seconds. Nothing is lost meanwhile: monitors keep what they measure and
send it afterwards.</p>
</main>
</body>
</html>
`;

function write(
  request: IncomingMessage,
  response: ServerResponse,
  status: number,
  type: string,
  body: string,
): void {
  if (!request.complete) closeLingering(request);
  response.writeHead(status, {
    'Content-Type': type,
    'Content-Length': Buffer.byteLength(body),
    'Cache-Control': 'no-store',
    'X-Content-Type-Options': 'nosniff',
    'Content-Security-Policy': "default-src 'none'; frame-ancestors 'none'",
    ...(status === 503 ? { 'Retry-After': String(RETRY_AFTER_SEC) } : {}),
    // What was not read of the body is not waited for.
    ...(request.complete ? {} : { Connection: 'close' }),
  });
  response.end(request.method === 'HEAD' ? undefined : body);
}
