import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startDatabase } from '#ops/database/server';

/**
 * A MariaDB for the tests on a free loopback port, thrown away afterwards. Settings given in the environment (a server
 * that runs already) are used instead.
 */
export default async function setUp(): Promise<(() => Promise<void>) | undefined> {
  process.env['BITTERN_PERSONAL_DATA_KEY'] ??= 'ab'.repeat(32);
  process.env['BITTERN_LOG_LEVEL'] ??= 'silent';
  if (process.env['BITTERN_DB_PASSWORD']) return undefined;
  const directory = mkdtempSync(join(tmpdir(), 'bittern-test-db-'));
  const place = { directory, port: await freePort(), user: 'bittern', password: 'test', bufferPoolMiB: 512 };
  const server = await startDatabase(place);
  process.env['BITTERN_DB_PORT'] = String(place.port);
  process.env['BITTERN_DB_USER'] = place.user;
  process.env['BITTERN_DB_PASSWORD'] = place.password;
  return async () => {
    await server.stop();
    rmSync(directory, { recursive: true, force: true });
  };
}

async function freePort(): Promise<number> {
  const probe = createServer();
  await new Promise<void>((listening) => probe.listen(0, '127.0.0.1', listening));
  const { port } = probe.address() as AddressInfo;
  await new Promise((closed) => probe.close(closed));
  return port;
}
