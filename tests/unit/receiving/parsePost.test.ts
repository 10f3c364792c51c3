import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parsePost } from '#ingest/receive/parsePost';

/** Long enough to be read in several pieces. */
const LONG = 220;
const record = (at: number, more: object = {}) => ({
  start: `2026-03-01T00:${String(at % 60).padStart(2, '0')}:00Z`,
  levels: Array.from({ length: 80 }, (_, band) => at + band / 10),
  ...more,
});
const records = (more: object = {}) => Array.from({ length: LONG }, (_, at) => record(at, more));

const expectSame = async (text: string) => {
  const bytes = Buffer.from(text);
  expect(bytes.length).toBeGreaterThan(66 * 1024);
  let whole: unknown;
  try {
    whole = JSON.parse(text);
  } catch {
    await expect(parsePost(bytes)).rejects.toThrow(SyntaxError);
    return;
  }
  expect(await parsePost(bytes)).toEqual(whole);
};

const LIST = JSON.stringify(records());

test.each([
  ['as monitors write it', `{"bands":[100],"sentAt":"x","intervals":${LIST}}`],
  ['names after the list', `{"intervals":${LIST},"bands":[100]}`],
  ['with blanks', `{"bands": [100], "intervals": ${LIST.replaceAll('},{', '}, {').replaceAll(',"', ', "')}}`],
  ['over several lines', JSON.stringify({ bands: [], intervals: records() }, null, 2)],
  ['not ASCII', JSON.stringify({ bands: [], intervals: records({ note: 'Brücke № 7' }) })],
  ['lists within records', JSON.stringify({ intervals: records({ more: [{ a: 1 }, { b: [{}, {}] }] }) })],
  ['brackets within text', JSON.stringify({ intervals: records({ note: '},{"intervals":[},{' }) })],
  ['the name within a name', `{"a\\"intervals":[1],"intervals":${LIST}}`],
  ['the list twice', `{"intervals":[1],"bands":[],"intervals":${LIST}}`],
  ['another list after it', `{"intervals":${LIST},"intervals":[2]}`],
  ['another list after it, its name escaped', `{"intervals":${LIST},"\\u0069ntervals":[2]}`],
  ['bands twice', `{"bands":[1],"intervals":${LIST},"bands":[{},{}]}`],
  ['a number for a name', `{"intervals":[],"1":${LIST}}`],
  ['an unknown name', `{"intervals":[],"__proto__":${LIST}}`],
  ['within another object', `{"bands":{"intervals":${LIST}}}`],
  ['a list', `[{"intervals":${LIST}}]`],
  ['cut short', `{"intervals":${LIST}`],
  ['something after it', `{"intervals":${LIST}}}`],
  ['a comma too many', `{"intervals":[${LIST.slice(1, -1)},]}`],
])('a long post reads as one text: %s', async (_, text) => expectSame(text));

test('whatever is put anywhere into a long post, it reads as one text, or as none', async () => {
  const text = `{"bands":[100],"intervals":${LIST}}`;
  const bit = fc.constantFrom(
    '{',
    '}',
    '[',
    ']',
    '"',
    ',',
    '\\',
    '},{',
    '"intervals":[',
    ']}',
    '{"a":[{},{}]},',
  );
  await fc.assert(
    fc.asyncProperty(bit, fc.nat(text.length), async (inserted, at) =>
      expectSame(text.slice(0, at) + inserted + text.slice(at)),
    ),
    { numRuns: 60 },
  );
});
