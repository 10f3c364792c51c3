import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { createConnection } from 'mysql2/promise';
import { untilAnswers } from '#ops/start/untilAnswers';
import { WEB_ARGUMENTS } from '#ops/start/webArguments';
import { WORKER_ARGUMENTS } from '#ops/start/workerArguments';
import { ensureCertificate, startDataServers } from './databases';
import { startHead } from './head';
import { dataNumbers, headPort, httpPort, settingsOf, webPort, type Layout } from './layout';
import { pidOf, startProcess, startedNames, stopProcess } from './processes';
import { startProxy, WEBS } from './proxy';

const WORKERS = [1, 2] as const;

/** Starts what does not run of the databases and the proxy in front of them. */
export async function startDatabases(layout: Layout): Promise<void> {
  for (const directory of [layout.directory, layout.databases]) {
    mkdirSync(directory, { recursive: true });
    // The databases' user goes through it; what is in it is its owner's.
    chmodSync(directory, 0o711);
  }
  ensureCertificate(layout);
  await startDataServers(layout, dataNumbers(layout));
  await startHead(layout);
  startProxy(layout);
  await untilListened(headPort(layout));
}

/** The proxy takes nobody before it has looked at a node twice. */
async function untilListened(port: number): Promise<void> {
  for (let attempts = 0; attempts < 100; attempts += 1) {
    const error = await createConnection({ host: '127.0.0.1', port, user: 'look', connectTimeout: 1_000 })
      .then((connection) => connection.end())
      .catch((failure: Error) => failure);
    if (error === undefined) return;
    await sleep(200);
  }
  throw new Error(`The proxy on port ${port} leads to no node of the head.`);
}

/** Starts those webs and workers that do not run, and waits until the proxy leads to a web. The schema must be there. */
export async function startPrograms(
  layout: Layout,
  settings: Record<string, string>,
  webScript = 'ops/http/server.ts',
): Promise<void> {
  const common = {
    ...settingsOf(layout),
    BITTERN_DB_MIGRATE: 'false',
    BITTERN_TRUSTED_PROXIES: '1',
    BITTERN_ORIGIN: `http://127.0.0.1:${httpPort(layout)}`,
    ...settings,
  };
  for (const number of WEBS)
    startOnce(layout, `web${number}`, [...WEB_ARGUMENTS, webScript], {
      ...common,
      BITTERN_PORT: String(webPort(layout, number)),
    });
  for (const number of WORKERS)
    startOnce(layout, `worker${number}`, [...WORKER_ARGUMENTS, 'ingest/worker.ts'], common);
  await untilAnswers(`http://127.0.0.1:${httpPort(layout)}/healthz`, 120_000);
}

function startOnce(
  layout: Layout,
  name: string,
  nodeArguments: string[],
  settings: Record<string, string>,
): void {
  if (pidOf(layout, name) === null)
    startProcess(layout, name, [process.execPath, ...nodeArguments], settings);
}

/** Stops all that was started, who asks before who answers. */
export async function stopAll(layout: Layout): Promise<void> {
  const rank = (name: string) =>
    ['web', 'worker', 'proxy', 'head', 'data'].findIndex((kind) => name.startsWith(kind));
  for (const name of startedNames(layout).sort((a, b) => rank(a) - rank(b))) await stopProcess(layout, name);
}

/** The secrets of a cluster in its directory, made at its first start. */
export function secretsIn(directory: string): { password: string; personalDataKey: string } {
  const path = join(directory, 'secrets.json');
  if (!existsSync(path)) {
    mkdirSync(directory, { recursive: true });
    const made = {
      password: randomBytes(24).toString('base64url'),
      personalDataKey: randomBytes(32).toString('hex'),
    };
    writeFileSync(path, JSON.stringify(made), { mode: 0o600 });
  }
  return JSON.parse(readFileSync(path, 'utf8')) as { password: string; personalDataKey: string };
}
