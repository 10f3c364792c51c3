import { beforeAll, expect, test } from 'vitest';
import { attachmentTypeOf } from '#lib/services/reports/attachment';
import { addressDigestOf, checkStamp, privateKeyOf, renewedStamp } from '#lib/services/reports/reportSecrets';

const NOW = 1_800_000_000;

beforeAll(() => {
  process.env['BITTERN_DB_PASSWORD'] ??= 'unused';
  process.env['BITTERN_PERSONAL_DATA_KEY'] ??= 'ab'.repeat(32);
});

test('a stamp holds for its network, after a person’s time and for half a day', () => {
  const stamp = renewedStamp('', 7, NOW);
  expect(checkStamp(stamp, 7, NOW + 1)).toEqual({ kind: 'too-fast' });
  expect(checkStamp(stamp, 7, NOW + 60)).toMatchObject({ kind: 'good' });
  expect(checkStamp(stamp, 7, NOW + 13 * 3600)).toEqual({ kind: 'expired' });
  expect(checkStamp(stamp, 8, NOW + 60)).toEqual({ kind: 'expired' });
  expect(checkStamp(stamp.replace(/^\d+/, String(NOW - 60)), 7, NOW + 1)).toEqual({ kind: 'expired' });
  expect(checkStamp('', 7, NOW)).toEqual({ kind: 'expired' });
  expect(renewedStamp(stamp, 7, NOW + 60)).toBe(stamp);
});

test('a private key follows from form and content, and from nothing that a resident sees', () => {
  const key = privateKeyOf('nonce', { words: 'hum' });
  expect(key).toMatch(/^[A-Za-z0-9_-]{43}$/);
  expect(privateKeyOf('nonce', { words: 'hum' })).toBe(key);
  expect(privateKeyOf('nonce', { words: 'hums' })).not.toBe(key);
  expect(privateKeyOf('other', { words: 'hum' })).not.toBe(key);
});

test('an address leaves a digest that changes by the day', () => {
  const digest = addressDigestOf('192.0.2.7', new Date('2026-11-10T09:00:00Z'));
  expect(digest).toEqual(addressDigestOf('192.0.2.7', new Date('2026-11-10T20:00:00Z')));
  expect(digest).not.toEqual(addressDigestOf('192.0.2.7', new Date('2026-11-11T09:00:00Z')));
});

test.each([
  ['\xff\xd8\xff\xe0', 'image/jpeg'],
  ['\x89PNG\r\n\x1a\n', 'image/png'],
  ['ID3\x04', 'audio/mpeg'],
  ['\0\0\0\x20ftypM4A ', 'audio/mp4'],
  ['OggS', 'audio/ogg'],
  ['RIFF\0\0\0\0WAVE', 'audio/wav'],
  ['<svg onload="alert(1)">', null],
  ['%PDF-1.7', null],
  ['', null],
])('a file is what its first bytes say: %j', (head, type) => {
  expect(attachmentTypeOf(Buffer.from(head, 'latin1'))).toBe(type);
});
