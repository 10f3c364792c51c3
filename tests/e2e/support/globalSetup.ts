import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { TestProject } from 'vitest/node';

declare module 'vitest' {
  interface ProvidedContext {
    origin: string;
    mailOrigin: string;
    demoPassword: string;
    dataDirectory: string;
    databasePort: number;
  }
}

const START_TIMEOUT_MS = 220_000;
const DEMO_DAYS = '9';
const DEMO_PASSWORD = 'a password for the tests';

/** The whole of Bittern on free ports with a short demo, as `ops/start.sh` starts it; stopped and removed afterwards. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const dataDirectory = mkdtempSync(join(tmpdir(), 'bittern-e2e-'));
  const [port, databasePort, smtpPort, mailWebPort, tilesPort] = await freePorts(5);
  const bittern = spawn(process.execPath, ['--import', 'tsx', 'ops/start/main.ts'], {
    env: {
      ...inherited(),
      BITTERN_DATA_DIR: dataDirectory,
      BITTERN_PORT: String(port),
      BITTERN_DB_PORT: String(databasePort),
      BITTERN_DB_USER: 'bittern',
      BITTERN_SMTP_PORT: String(smtpPort),
      BITTERN_MAIL_WEB_PORT: String(mailWebPort),
      BITTERN_TILES_PORT: String(tilesPort),
      BITTERN_DEMO_DAYS: DEMO_DAYS,
      BITTERN_DEMO_PASSWORD: DEMO_PASSWORD,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  await untilStarted(bittern);
  project.provide('origin', `http://127.0.0.1:${port}`);
  project.provide('mailOrigin', `http://127.0.0.1:${mailWebPort}`);
  project.provide('demoPassword', DEMO_PASSWORD);
  project.provide('dataDirectory', dataDirectory);
  project.provide('databasePort', databasePort ?? 0);
  return async () => {
    const ended = new Promise((done) => bittern.once('exit', done));
    bittern.kill('SIGTERM');
    await ended;
    rmSync(dataDirectory, { recursive: true, force: true });
  };
}

/** The environment without settings that name a database of somebody else's. */
function inherited(): Record<string, string | undefined> {
  const names = Object.keys(process.env).filter((name) => !name.startsWith('BITTERN_DB_'));
  return Object.fromEntries(names.map((name) => [name, process.env[name]]));
}

function untilStarted(bittern: ChildProcess): Promise<void> {
  let output = '';
  return new Promise((started, failed) => {
    const timeout = setTimeout(
      () => failed(new Error(`Bittern did not start in time:\n${output}`)),
      START_TIMEOUT_MS,
    );
    const read = (chunk: Buffer) => {
      output += chunk.toString();
      if (!output.includes('Ctrl-C stops everything')) return;
      clearTimeout(timeout);
      started();
    };
    bittern.stdout?.on('data', read);
    bittern.stderr?.on('data', read);
    bittern.once('exit', () => failed(new Error(`Bittern ended at its start:\n${output}`)));
  });
}

async function freePorts(count: number): Promise<number[]> {
  const probes = Array.from({ length: count }, () => createServer());
  await Promise.all(probes.map((probe) => new Promise<void>((done) => probe.listen(0, '127.0.0.1', done))));
  const ports = probes.map((probe) => (probe.address() as AddressInfo).port);
  await Promise.all(probes.map((probe) => new Promise((done) => probe.close(done))));
  return ports;
}
