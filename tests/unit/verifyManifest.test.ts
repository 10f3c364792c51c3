import { spawnSync } from 'node:child_process';
import { createHash, generateKeyPairSync, sign } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, expect, test } from 'vitest';

/** ops/verify/verify.mjs on manifests as earlier months have them: their data without the part of the year so far. */
const directory = mkdtempSync(join(tmpdir(), 'bittern-verify-'));
afterAll(() => rmSync(directory, { recursive: true, force: true }));

const { publicKey, privateKey } = generateKeyPairSync('ed25519');
const sha256 = (bytes: string | Buffer) => createHash('sha256').update(bytes).digest('hex');
const station = { code: 'MER-01', intervals: 44_640, sha256: 'a'.repeat(64) };
const FILE = 'the month as it was issued';

function manifestOf(month: string, changes: Record<string, unknown> = {}) {
  return {
    network: { slug: 'merrow', name: 'Merrow Estuary' },
    month,
    revision: 1,
    issuedBy: 'Odile',
    issuedAt: '2026-04-03T09:00:00Z',
    publicKey: sha256(publicKey.export({ type: 'spki', format: 'der' })),
    files: [{ name: 'merrow.pdf', sha256: sha256(FILE) }],
    data: {
      sha256: sha256(`${station.code} ${station.intervals} ${station.sha256}\n`),
      stations: [station],
    },
    ...changes,
  };
}

function verified(manifest: object) {
  const text = JSON.stringify(manifest);
  const write = (name: string, bytes: string | Buffer) => {
    writeFileSync(join(directory, name), bytes);
    return join(directory, name);
  };
  const paths = [
    write('manifest.json', text),
    write('manifest.sig', sign(null, Buffer.from(text), privateKey)),
    write('key.pem', publicKey.export({ type: 'spki', format: 'pem' })),
    write('merrow.pdf', FILE),
  ];
  const { status, stdout } = spawnSync('node', ['ops/verify/verify.mjs', ...paths], { encoding: 'utf8' });
  return { status, stdout };
}

const SAYS_NOTHING = 'rests on months before, of which this manifest says nothing';

test('without the part of the year everything else is checked, and it says what it cannot vouch for', () => {
  const march = verified(manifestOf('2026-03'));
  expect(march).toMatchObject({ status: 0, stdout: expect.stringContaining(SAYS_NOTHING) });
  expect(march.stdout).toContain('that of its 1 stations');
  expect(march.stdout).toContain('merrow.pdf is merrow.pdf as issued');
  // January has no months before it.
  expect(verified(manifestOf('2026-01')).stdout).not.toContain(SAYS_NOTHING);
});

test('a wrong digest is found without it, too; a manifest without data is checked for its files', () => {
  const wrong = { data: { sha256: 'b'.repeat(64), stations: [station] } };
  expect(verified(manifestOf('2026-03', wrong))).toMatchObject({ status: 1 });
  const bare = verified(manifestOf('2026-03', { data: undefined }));
  expect(bare).toMatchObject({ status: 0, stdout: expect.stringContaining('Everything is right.') });
  expect(bare.stdout).not.toContain('digest of the intervals');
});
