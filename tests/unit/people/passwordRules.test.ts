import fc from 'fast-check';
import { expect, test } from 'vitest';
import { passwordProblem } from '#lib/services/people/passwordRules';

const whose = {
  email: 'ines.valcourt@merrow.example',
  name: 'Ines Valcourt',
  networks: ['Merrow Estuary', 'merrow'],
};

test.each([
  'correct heron lantern',
  'a bittern booms at dusk here',
  'häuser über dem wasser',
  '水鳥が葦の中で鳴いている夜明け',
  'x9#Lq2!vB7@t',
  '   spaces count   ',
  'q'.repeat(10) + 'w7'.repeat(59),
])('taken: %s', (password) => {
  expect(passwordProblem(password, whose)).toBeNull();
});

test.each([
  ['short', 'too short', /at least 12/],
  ['eleven signs', 'elevensigns', /at least 12/],
  ['eleven characters of two units each', '🦆🐟🌊🌙🌾🦢🐸🍃🦉🐚🌳', /at least 12/],
  ['one character over and over', 'aaaaaaaaaaaaaaaa', /repeats/],
  ['a piece over and over', 'abc1abc1abc1abc1', /repeats/],
  ['counting up', 'abcdefghijklmnop', /counts/],
  ['a common one', 'qwertyuiop123456', /tried first/],
  ['a common one in capitals with signs around it', '!!DRAGON!!20261', /tried first/],
  ['the network and the year', 'Merrow-Estuary-2026', /names/],
  ['the product and digits', 'bittern123456', /names/],
  ['the own address', 'ines.valcourt@merrow.example', /names/],
  ['the own name twice', 'valcourtvalcourt', /names/],
])('refused, %s', (_, password, words) => {
  expect(passwordProblem(password, whose)).toMatch(words);
});

test('no kind of character is asked for or refused, and nothing is cut off up to a thousand', () => {
  const letters = fc.string({ unit: 'grapheme', minLength: 20, maxLength: 128 });
  fc.assert(
    fc.property(letters, (text) => {
      const words = passwordProblem(`${text} lantern heron tide`, whose);
      return words === null;
    }),
  );
  const long = Array.from({ length: 1000 }, (_, n) => String.fromCodePoint(97 + ((n * n + 3) % 23))).join('');
  expect(passwordProblem(long, whose)).toBeNull();
  expect(passwordProblem(`${long}x`, whose)).toMatch(/at most/);
});
