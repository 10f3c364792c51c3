import { expect, test } from 'vitest';
import { csvText } from '#lib/format/csvText';

test.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1', '\n=1', '\0=1', '＝1+1', '＋1', '－1', '＠A1'])(
  'a spreadsheet takes %j for text',
  (cell) => expect(csvText([[cell]])).toMatch(/^"?'/),
);

test('numbers stay numbers, and text is quoted where it must be', () => {
  expect(csvText([[-4.5, 0, null, true, 'a,b', 'say "dB"', 'two\nlines', 'plain']])).toBe(
    '-4.5,0,,true,"a,b","say ""dB""","two\nlines",plain\r\n',
  );
  expect(csvText([['=HYPERLINK("http://b.example","x")']])).toBe(
    `"'=HYPERLINK(""http://b.example"",""x"")"\r\n`,
  );
});
