import { expect, test } from 'vitest';
import { allowAttempt, forgetAttempts } from '#lib/auth/attempts';

const MINUTE_MS = 60_000;

test('ten attempts in a quarter of an hour, then a wait that ends', () => {
  for (let attempt = 0; attempt < 10; attempt += 1) expect(allowAttempt('a', attempt * MINUTE_MS)).toBe(0);
  expect(allowAttempt('a', 10 * MINUTE_MS)).toBe(5 * 60);
  expect(allowAttempt('a', 15 * MINUTE_MS + 1)).toBe(0);
});

test('one caller does not lock out another, and a success clears the count', () => {
  for (let attempt = 0; attempt < 12; attempt += 1) allowAttempt('b', 0);
  expect(allowAttempt('b', 0)).toBeGreaterThan(0);
  expect(allowAttempt('c', 0)).toBe(0);
  forgetAttempts('b');
  expect(allowAttempt('b', 0)).toBe(0);
});
