import { createServer } from 'node:http';
import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { config } from '#lib/config/index';
import { log } from '#lib/config/log';
import { closeDb } from '#db/client';
import { untilSchemaIsCurrent } from '#db/currentSchema';
import { warnOfAuditGrant } from '#lib/services/audit/warnOfGrant';
import { BodyPace } from './bodyPace';
import { makeFront, type AstroHandler } from './front';
import { behindGate, type Gate } from './maintenance';

const DRAIN_MS = 20_000;

const entryUrl = pathToFileURL(resolve('dist/server/entry.mjs')).href;
const { handler } = (await import(entryUrl)) as { handler: AstroHandler };
const { host, port } = config();

const gate: Gate = { isOpen: false };
const front = behindGate(makeFront(handler, config()), gate);
const pace = new BodyPace();
pace.start();
const server = createServer((request, response) => {
  pace.watch(request);
  front(request, response);
});
// A client that dribbles its headers or body holds a connection no longer than this.
server.headersTimeout = 15_000;
server.requestTimeout = 600_000;
server.keepAliveTimeout = 10_000;

server.on('error', (error: NodeJS.ErrnoException) => {
  const reason =
    error.code === 'EADDRINUSE' ? `port ${port} is taken; choose another by BITTERN_PORT` : error.message;
  log().fatal(`web cannot listen on ${host}:${port}: ${reason}`);
  process.exit(1);
});
server.listen(port, host, () => log().info({ host, port }, 'web listens'));
const { protocol, hostname } = new URL(config().origin);
if (protocol === 'http:' && !/^(localhost|127\.[\d.]+|\[::1\])$/.test(hostname)) {
  log().warn(
    'people reach Bittern without https, so passwords and cookies can be read on the way (BITTERN_ORIGIN)',
  );
}

let isDraining = false;

/** Finishes the requests under way, then ends. */
function drain(signal: string): void {
  if (isDraining) return;
  isDraining = true;
  log().info({ signal }, 'web drains');
  const lastResort = setTimeout(() => process.exit(0), DRAIN_MS);
  lastResort.unref();
  server.close(() => void closeDb().finally(() => process.exit(0)));
  server.closeIdleConnections();
}

untilSchemaIsCurrent({
  mayMigrate: config().database.mayMigrate,
  tell: (what) => log().warn(`web waits: ${what}`),
}).then(
  () => {
    gate.isOpen = true;
    void warnOfAuditGrant();
  },
  (error: unknown) => {
    log().fatal({ err: error }, 'web cannot start: the schema is not as it must be');
    process.exit(1);
  },
);

process.on('SIGTERM', () => drain('SIGTERM'));
process.on('SIGINT', () => drain('SIGINT'));
