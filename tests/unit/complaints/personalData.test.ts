import { beforeAll, expect, test } from 'vitest';
import {
  newWrappedKey,
  openValue,
  PersonalDataUnreadable,
  sealValue,
} from '#lib/services/complaints/personalData';

beforeAll(() => {
  process.env['BITTERN_DB_PASSWORD'] ??= 'unused';
  process.env['BITTERN_PERSONAL_DATA_KEY'] ??= 'ab'.repeat(32);
});

const person = { name: 'Ada Wren', words: 'a hum “like a fridge”, ü' };

test('what was sealed opens, and no byte of it stands in the sealed form', () => {
  const key = newWrappedKey(7);
  const sealed = sealValue(key, 7, 'person', person);
  expect(openValue(key, 7, 'person', sealed)).toEqual(person);
  expect(sealed.includes('Wren')).toBe(false);
  expect(sealed[0]).toBe(1);
});

test('the wrapped key fits its column, and two keys and two sealings differ', () => {
  const [first, second] = [newWrappedKey(7), newWrappedKey(7)];
  expect(first.length).toBeLessThanOrEqual(80);
  expect(first.equals(second)).toBe(false);
  expect(sealValue(first, 7, 'person', person).equals(sealValue(first, 7, 'person', person))).toBe(false);
});

test.each([
  ['another complaint', (key: Buffer, sealed: Buffer) => openValue(key, 8, 'person', sealed)],
  ['another purpose', (key: Buffer, sealed: Buffer) => openValue(key, 7, 'reply', sealed)],
  ['another key', (_: Buffer, sealed: Buffer) => openValue(newWrappedKey(7), 7, 'person', sealed)],
  ['a cut ciphertext', (key: Buffer, sealed: Buffer) => openValue(key, 7, 'person', sealed.subarray(0, 20))],
  ['no ciphertext', (key: Buffer) => openValue(key, 7, 'person', Buffer.alloc(0))],
])('does not open under %s', (_, attempt) => {
  const key = newWrappedKey(7);
  const sealed = sealValue(key, 7, 'person', person);
  expect(() => attempt(key, sealed)).toThrow(PersonalDataUnreadable);
});

test('every changed byte is noticed', () => {
  const key = newWrappedKey(7);
  const sealed = sealValue(key, 7, 'person', person);
  for (let at = 0; at < sealed.length; at += 1) {
    const changed = Buffer.from(sealed);
    changed[at] = (changed[at] ?? 0) ^ 1;
    expect(() => openValue(key, 7, 'person', changed)).toThrow(PersonalDataUnreadable);
  }
});
