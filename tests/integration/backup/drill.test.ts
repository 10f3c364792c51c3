import { mkdtempSync } from 'node:fs';
import { readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { findComplaint } from '#db/queries/complaints';
import { erasePersonalData } from '#lib/services/complaints/closeComplaint';
import { readVerified } from '#ops/backup/manifest';
import { readSealed } from '#ops/backup/sealedFile';
import { useFreshSchema } from '../support/freshSchema';
import { complain, fillInstance, startWriting, WORDS, wordsIn } from './fixture';
import { askServer, freshName, runScript, tablesOf, triggersOf } from './support';

/**
 * The drill: what a backup holds comes back in another instance, the same in every table, and what was changed or erased does not.
 */
const PASSWORD = 'a drill with five words';
const TO_BE_ERASED = 'Somebody who will be erased';
const root = mkdtempSync(join(tmpdir(), 'bittern-drill-'));
const backups = join(root, 'backups');
const target = { BITTERN_DB_NAME: freshName(), BITTERN_DATA_DIR: join(root, 'target') };
process.env['BITTERN_DATA_DIR'] = join(root, 'source');

vi.setConfig({ testTimeout: 120_000, hookTimeout: 120_000 });
useFreshSchema();
let filled: Awaited<ReturnType<typeof fillInstance>>;
let erased: string;

beforeAll(async () => {
  filled = await fillInstance(PASSWORD);
  await complain(filled.session, WORDS);
  erased = await complain(filled.session, TO_BE_ERASED);
  await writeFile(passphraseFile, 'of several words\n', { mode: 0o600 });
});

afterAll(async () => {
  await askServer(`DROP DATABASE IF EXISTS ${target.BITTERN_DB_NAME}`);
  await rm(root, { recursive: true, force: true });
});

const passphraseFile = join(root, 'passphrase');
const encrypting = { BITTERN_BACKUP_DIR: backups, BITTERN_BACKUP_PASSPHRASE_FILE: passphraseFile };
const restore = (args: string[]) => runScript('ops/restore.sh', args, { ...target, ...encrypting });
const newest = async (kind: 'data' | 'keys') =>
  join(backups, kind, (await readdir(join(backups, kind))).sort().at(-1) ?? '');
const ok = { code: 0, said: expect.any(String) as string };

it('brings every table, trigger and file back in another instance, though others wrote meanwhile', async () => {
  const source = process.env['BITTERN_DB_NAME'] ?? '';
  const before = await tablesOf(source);
  const writing = startWriting(filled.networkId);
  expect(await runScript('ops/backup.sh', [], encrypting)).toEqual(ok);
  expect(await writing.stop()).toBeGreaterThan(0);
  const restored = await restore(['latest']);
  expect(restored).toEqual(ok);
  expect(restored.said).toContain('the audit trail holds');

  const after = await tablesOf(target.BITTERN_DB_NAME);
  expect(before['sessions']).toMatch(/^1 /);
  expect(after['sessions']).toMatch(/^0 /);
  for (const name of ['sessions', 'audit_log', 'audit_head']) delete before[name];
  expect(after).toMatchObject(before);
  const acts = `SELECT * FROM audit_log ORDER BY id`;
  const actsAfter = await askServer(acts, target.BITTERN_DB_NAME);
  expect(actsAfter).toEqual((await askServer(acts, source)).slice(0, actsAfter.length));
  expect(await triggersOf(target.BITTERN_DB_NAME)).toEqual(await triggersOf(source));
  const photo = join(target.BITTERN_DATA_DIR, 'photos', filled.photo.toString('hex'));
  expect(await readFile(photo, 'utf8')).toBe('a photo');
});

it('refuses a place for secrets before it backs anything up', async () => {
  const sets = await readdir(join(backups, 'data'));
  const refused = { code: 2, said: expect.any(String) as string };
  const backUp = (path: string, settings: Record<string, string>) =>
    runScript('ops/backup.sh', ['--secrets-to', path], settings);
  expect(await backUp(join(root, 'secrets'), { BITTERN_BACKUP_DIR: backups })).toEqual(refused);
  expect(await backUp(join(backups, 'secrets'), encrypting)).toEqual(refused);
  expect(await backUp(passphraseFile, encrypting)).toEqual(refused);
  expect(await readdir(join(backups, 'data'))).toEqual(sets);
});

it('lets people sign in and reads what residents told, in the restored instance', async () => {
  await insideTarget(async ({ signInStatus, findAuditBreak }) => {
    expect(await signInStatus(filled.email, PASSWORD)).toBe(204);
    expect(await signInStatus(filled.email, 'another five words entirely')).toBe(401);
    expect(await findAuditBreak()).toBeNull();
  });
  expect(await wordsIn(target.BITTERN_DB_NAME)).toEqual([WORDS, TO_BE_ERASED]);
});

it('keeps what opens personal data apart from the data', async () => {
  const data = await plainText(join(await newest('data'), 'database.sql.gz'));
  const keys = await plainText(join(await newest('keys'), 'keys.sql.gz'));
  expect(data).not.toMatch(/INSERT INTO `complaint_(keys|contacts)`/);
  expect(data).toContain('INSERT INTO `complaint_private`');
  expect(keys.match(/INSERT INTO `\w+`/g)).toEqual([
    'INSERT INTO `complaint_contacts`',
    'INSERT INTO `complaint_keys`',
  ]);
});

it('refuses an instance that is not empty, another passphrase, and a set with one changed byte', async () => {
  expect(await restore(['latest'])).toMatchObject({ code: 4 });
  const set = await newest('data');
  const other = join(root, 'other');
  await writeFile(other, 'of other words\n');
  await expect(readVerified(set, other)).rejects.toMatchObject({ exitCode: 3 });
  for (const name of await readdir(set)) {
    const undo = await flipByte(join(set, name));
    await expect(readVerified(set, passphraseFile), name).rejects.toThrow();
    await undo();
  }
  await expect(readVerified(set, passphraseFile)).resolves.toMatchObject({ kind: 'data' });
  const undo = await flipByte(join(set, 'database.sql.gz'));
  expect(await restore([set, '--replace'])).toMatchObject({ code: 3 });
  await undo();
});

it('brings nobody back who was erased since: keys are the newest', async () => {
  const older = await newest('data');
  const complaint = await findComplaint(filled.networkId, erased);
  if (!complaint) throw new Error('The complaint is not there.');
  await erasePersonalData({ by: 'resident' }, complaint);
  expect(await runScript('ops/backup.sh', [], encrypting)).toEqual(ok);
  expect(await restore([older, '--replace'])).toEqual(ok);
  const [count] = await askServer('SELECT COUNT(*) AS sealed FROM complaint_private', target.BITTERN_DB_NAME);
  expect(count).toEqual({ sealed: 2 });
  expect(await wordsIn(target.BITTERN_DB_NAME)).toEqual([WORDS]);
});

/** Changes one byte in the middle of a file, and answers how to put it back. */
async function flipByte(path: string): Promise<() => Promise<void>> {
  const bytes = await readFile(path);
  const changed = Buffer.from(bytes);
  const middle = changed.length >> 1;
  changed.writeUInt8(changed.readUInt8(middle) ^ 1, middle);
  await writeFile(path, changed);
  return () => writeFile(path, bytes);
}

async function plainText(path: string): Promise<string> {
  let text = '';
  await readSealed(path, passphraseFile, async (plain) => {
    for await (const chunk of plain) text += String(chunk);
  });
  return text;
}

/** Runs work with the modules as the restored instance's processes load them. */
async function insideTarget(
  work: (inside: {
    signInStatus: (email: string, password: string) => Promise<number>;
    findAuditBreak: () => Promise<number | null>;
  }) => Promise<void>,
): Promise<void> {
  const { BITTERN_DB_NAME: source, BITTERN_DATA_DIR: directory } = process.env;
  vi.resetModules();
  Object.assign(process.env, target);
  const { closeDb } = await import('#db/client');
  const { signInStatus } = await import('../people/support');
  const { findAuditBreak } = await import('#db/queries/audit');
  try {
    await work({ signInStatus, findAuditBreak });
  } finally {
    await closeDb();
    Object.assign(process.env, { BITTERN_DB_NAME: source, BITTERN_DATA_DIR: directory });
  }
}
