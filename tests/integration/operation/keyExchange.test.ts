import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import { closeDb, db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { config } from '#lib/config/index';
import { beginFactor, begunSecret } from '#lib/services/people/secondFactor';
import { isSignedBy, signingKey, signWith } from '#lib/services/summaries/seal/keys';
import { complain, fillInstance, wordsIn } from '../backup/fixture';
import { useFreshSchema } from '../support/freshSchema';
import { makePerson } from '../support/people';
import { runScript } from '../../faults/support/scriptProcess';

/** The key of personal data, exchanged for another one and back again. */
vi.setConfig({ testTimeout: 180_000, hookTimeout: 120_000 });
const directory = mkdtempSync(join(tmpdir(), 'bittern-keys-'));
process.env['BITTERN_DATA_DIR'] = directory;
useFreshSchema();

const ours = () => config().personalDataKey.toString('hex');
const other = randomBytes(32).toString('hex');
const name = () => process.env['BITTERN_DB_NAME'] ?? '';
let networkId: number;
let person: string;
let secret: Buffer | null;

beforeAll(async () => {
  const filled = await fillInstance('a drill with five words');
  networkId = filled.networkId;
  await complain(filled.session, 'Woken by a hum');
  await complain(filled.session, 'And again');
  person = (await makePerson(networkId, ['operator'])).userId;
  await beginFactor(person);
  secret = await begunSecret(person);
  await signingKey(networkId);
});

afterAll(() => rmSync(directory, { recursive: true, force: true }));

async function exchange(before: string, now: string) {
  await closeDb();
  return runScript('ops/keys/exchange.ts', {
    BITTERN_PERSONAL_DATA_KEY: now,
    BITTERN_PERSONAL_DATA_KEY_BEFORE: before,
  }).ended;
}

const contacts = async () =>
  (await db()('complaint_contacts').orderBy(['complaint_id', 'kind'])).map(({ digest, ...row }) => ({
    ...row,
    digest: (digest as Buffer).toString('hex'),
  }));

test('everything that was sealed opens with the new key alone, also where it was killed on the way; and the other way round', async () => {
  const [digestsBefore, key, sealedBefore] = [
    await contacts(),
    await signingKey(networkId),
    await db()('complaint_keys').orderBy('complaint_id'),
  ];
  expect(digestsBefore.length).toBeGreaterThan(2);
  const signed = signWith(key, 'a month');

  expect(await exchange(ours(), other)).toMatchObject({ code: 0 });
  await expect(wordsIn(name())).rejects.toThrow('cannot be opened');
  expect(await begunSecret(person)).toBeNull();
  expect(await contacts()).not.toEqual(digestsBefore);

  // Killed after the first: one row still has the earlier key.
  await db()('complaint_keys')
    .where({ complaint_id: sealedBefore[1].complaint_id })
    .update({ wrapped_key: sealedBefore[1].wrapped_key });
  const goneOn = await exchange(ours(), other);
  expect(goneOn).toMatchObject({ code: 0, output: expect.stringContaining('complaint: 1 wrapped anew') });
  expect(goneOn.output).toContain('second factor of person: 0 wrapped anew');

  expect(await exchange(other, ours())).toMatchObject({ code: 0 });
  expect(await wordsIn(name())).toEqual(['Woken by a hum', 'And again']);
  expect(await begunSecret(person)).toEqual(secret);
  expect(await contacts()).toEqual(digestsBefore);
  const after = await signingKey(networkId);
  expect(isSignedBy(key.publicSpki, 'a month', signWith(after, 'a month'))).toBe(true);
  expect(isSignedBy(key.publicSpki, 'a month', signed)).toBe(true);
  expect(await findAuditBreak()).toBeNull();
});

test('a wrong earlier key changes nothing and says what stays closed; nobody else may be connected', async () => {
  const before = await db()('complaint_keys').orderBy('complaint_id');
  const wrong = await exchange(randomBytes(32).toString('hex'), other);
  const closed = `Neither key opens: complaint ${before[0].complaint_id}`;
  expect(wrong).toMatchObject({ code: 1, output: expect.stringContaining(closed) });
  expect(await db()('complaint_keys').orderBy('complaint_id')).toEqual(before);
  expect(await exchange('short', other)).toMatchObject({ code: 2 });

  const settings = { BITTERN_PERSONAL_DATA_KEY: other, BITTERN_PERSONAL_DATA_KEY_BEFORE: ours() };
  await db()('users').first('id');
  expect(await runScript('ops/keys/exchange.ts', settings).ended).toMatchObject({ code: 4 });
  expect(await wordsIn(name())).toEqual(['Woken by a hum', 'And again']);
});
