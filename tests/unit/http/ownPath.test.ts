import fc from 'fast-check';
import { expect, test } from 'vitest';
import { ownPath } from '#lib/http/ownPath';

test.each(['/', '/n/merrow/map?at=2026-03-01T00:00:00Z#legend', '/n/merrow/stations/MER-01'])(
  '%s is gone on to',
  (path) => expect(ownPath(path)).toBe(path),
);

test.each([
  '//elsewhere.example',
  '/\\elsewhere.example',
  '\\\\elsewhere.example',
  'https://elsewhere.example',
  'javascript:alert(1)',
  '/\t/elsewhere.example',
  '/\n/elsewhere.example',
  ' //elsewhere.example',
  '',
  null,
  undefined,
])('%j is not', (given) => expect(ownPath(given)).toBe('/'));

test('whatever is asked for stays on this site', () => {
  const parts = fc.constantFrom(
    '/',
    '\\',
    '.',
    '@',
    ':',
    '%2f',
    '%5c',
    '\t',
    '#',
    '?',
    'a',
    'https',
    'b.example',
  );
  fc.assert(
    fc.property(fc.array(parts, { maxLength: 8 }), (list) => {
      const base = 'https://noise.merrow.example';
      expect(new URL(ownPath(list.join('')), base).origin).toBe(base);
    }),
    { seed: 9, numRuns: 2_000 },
  );
});
