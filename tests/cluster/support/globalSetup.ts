import { chmodSync, existsSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { TestProject } from 'vitest/node';
import { httpPort, layoutIn, settingsOf, type Layout } from '#ops/cluster/layout';
import { startDatabases, stopAll } from '#ops/cluster/programs';

/** Ports that one cluster needs, from its first one on. */
const PORTS = 60;
const DEMO_PASSWORD = 'a password for the tests';
const MEMORY = '/dev/shm';

/**
 * A cluster for the tests, thrown away afterwards: three nodes of the head, two data servers and the proxy, encrypted between each other. Its databases lie in memory where there
 * is such a place, because each test's database is hundreds of tables. One that runs already is used where `BITTERN_TEST_CLUSTER` has its layout.
 */
export default async function setUp(project: TestProject): Promise<(() => Promise<void>) | undefined> {
  process.env['BITTERN_PERSONAL_DATA_KEY'] ??= 'ab'.repeat(32);
  process.env['BITTERN_LOG_LEVEL'] ??= 'silent';
  const running = process.env['BITTERN_TEST_CLUSTER'];
  if (running !== undefined) {
    useCluster(project, JSON.parse(running) as Layout);
    return undefined;
  }
  const directory = mkdtempSync(join(tmpdir(), 'bittern-test-cluster-'));
  const databases = mkdtempSync(join(existsSync(MEMORY) ? MEMORY : directory, 'bittern-test-cluster-'));
  for (const made of [directory, databases]) chmodSync(made, 0o711);
  const layout: Layout = {
    ...layoutIn(directory, { basePort: await freeRange(), dataServers: 2, password: 'test', hasTls: true }),
    databases,
  };
  const stop = async () => {
    await stopAll(layout);
    for (const made of [directory, databases]) rmSync(made, { recursive: true, force: true });
  };
  try {
    await startDatabases(layout);
  } catch (error) {
    await stop();
    throw error;
  }
  useCluster(project, layout);
  return stop;
}

/** Settings for tests that ask the databases, and the address of the webs for those that ask these as people do. */
function useCluster(project: TestProject, layout: Layout): void {
  Object.assign(process.env, settingsOf(layout), { BITTERN_TEST_CLUSTER: JSON.stringify(layout) });
  project.provide('origin', `http://127.0.0.1:${httpPort(layout)}`);
  project.provide('demoPassword', DEMO_PASSWORD);
}

/** The first of many ports on which nothing listens. */
async function freeRange(): Promise<number> {
  for (let first = 21_000; first < 30_000; first += 100) {
    const free = await Promise.all(Array.from({ length: PORTS }, (_, at) => isFree(first + at)));
    if (free.every(Boolean)) return first;
  }
  throw new Error('There is no range of free ports for a cluster.');
}

function isFree(port: number): Promise<boolean> {
  const probe = createServer();
  return new Promise((answer) => {
    probe.once('error', () => answer(false));
    probe.listen(port, '127.0.0.1', () => probe.close(() => answer(true)));
  });
}
