import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import { closeDb, db } from '#db/client';
import { migrateUp } from '#db/migrateUp';
import { parseConfig } from '#lib/config/config';
import { connect } from '#ops/backup/server';
import { startDump } from '#ops/backup/databaseTools';
import { makeCertificate } from '#ops/cluster/certificate';
import { startServerOfOwn, type ServerOfOwn } from '../support/serverOfOwn';

/** A database that takes nobody without TLS. */
vi.setConfig({ testTimeout: 120_000, hookTimeout: 120_000 });
const directory = mkdtempSync(join(tmpdir(), 'bittern-tls-'));
const of = { names: 'DNS:database.example,IP:127.0.0.1', days: 2 };
const own = makeCertificate(directory, 'database', of);
const stranger = makeCertificate(directory, 'stranger', of);
let running: ServerOfOwn;

beforeAll(async () => {
  running = await startServerOfOwn(join(directory, 'server'), [
    `--ssl-cert=${own.certificate}`,
    `--ssl-key=${own.key}`,
  ]);
  await running.asRoot(`ALTER USER bittern@'127.0.0.1' REQUIRE SSL`);
  process.env['BITTERN_DB_TLS_CA'] = own.certificate;
});

afterAll(async () => {
  await closeDb();
  await running.server.stop();
  rmSync(directory, { recursive: true, force: true });
});

const settings = (changes: Record<string, string | undefined>) => parseConfig({ ...process.env, ...changes });
const refusal = (changes: Record<string, string | undefined>) =>
  connect(settings(changes)).then(
    async (connection) => {
      await connection.end();
      return null;
    },
    (error: { code?: string }) => error.code,
  );

test('Bittern’s connections are protected: pages, migrations, and those of backups', async () => {
  await migrateUp();
  const [[status]] = await db().raw("SHOW STATUS LIKE 'Ssl_version'");
  expect(status.Value).toMatch(/^TLSv1\.[23]$/);
  const dump = startDump(settings({}));
  let text = '';
  for await (const part of dump.output) text += String(part);
  await dump.ended;
  expect(text).toContain('CREATE TABLE `networks`');
});

test('without the setting, by a stranger’s certificate, or under another name there is no connection', async () => {
  expect(await refusal({})).toBeNull();
  expect(await refusal({ BITTERN_DB_TLS_CA: undefined })).toBe('ER_ACCESS_DENIED_ERROR');
  expect(await refusal({ BITTERN_DB_TLS_CA: stranger.certificate })).toBe('HANDSHAKE_SSL_ERROR');
  expect(await refusal({ BITTERN_DB_HOST: 'localhost' })).toBe('HANDSHAKE_SSL_ERROR');
});
