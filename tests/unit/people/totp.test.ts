import { expect, test } from 'vitest';
import { matchingStep, newTotpSecret, secretWords, totpUri } from '#lib/services/people/totp';

/** RFC 6238, appendix B: SHA-1, eight digits, this secret. */
const SECRET = Buffer.from('12345678901234567890');
const VECTORS = [
  [59, '94287082'],
  [1_111_111_109, '07081804'],
  [1_111_111_111, '14050471'],
  [1_234_567_890, '89005924'],
  [2_000_000_000, '69279037'],
  [20_000_000_000, '65353130'],
] as const;

test.each(VECTORS)('at %i s it is %s', (atSec, code) => {
  expect(matchingStep(SECRET, code, atSec, 8)).toBe(Math.floor(atSec / 30));
});

test('one step either way, and no more, each told by its own number', () => {
  const [atSec, code] = [1_234_567_890, '005924'];
  const step = Math.floor(atSec / 30);
  expect(matchingStep(SECRET, code, atSec)).toBe(step);
  expect(matchingStep(SECRET, code, atSec + 30)).toBe(step);
  expect(matchingStep(SECRET, code, atSec - 30)).toBe(step);
  expect(matchingStep(SECRET, code, atSec + 60)).toBeNull();
  expect(matchingStep(SECRET, code, atSec - 60)).toBeNull();
  expect(matchingStep(SECRET, '05924', atSec)).toBeNull();
});

test('a secret has 160 bits, and the picture says the same as the text', () => {
  const secret = newTotpSecret();
  expect(secret).toHaveLength(20);
  const uri = new URL(totpUri(secret, 'ines@merrow.example'));
  expect(uri.searchParams.get('secret')).toBe(secretWords(secret).replaceAll(' ', ''));
  expect(decodeURIComponent(uri.pathname)).toContain('Bittern:ines@merrow.example');
});
