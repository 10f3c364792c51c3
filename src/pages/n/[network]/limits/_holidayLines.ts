import { isLocalDate } from '#lib/time/zone';
import { invalidFields } from '#lib/http/problem';

const LINE = /^"?(\d{4}-\d{2}-\d{2})"?(?:\s*[,;]|[\t ])(.*)$/;
const HEADING = /^"?date"?\s*[,;\t]/i;

/**
 * Named dates of a text of lines, `2026-12-25, Christmas Day`, also as a spreadsheet copies or saves them. Empty lines and a heading do
 * not count. @throws {Problem} 422 that names the first line that cannot be read.
 */
export function holidaysOfLines(text: string): { items: { date: string; name: string }[] } {
  const items = text.split(/\r?\n/).flatMap((line, at) => {
    const trimmed = line.trim();
    if (trimmed === '' || (at === 0 && HEADING.test(trimmed))) return [];
    const [, date = '', rest = ''] = LINE.exec(trimmed) ?? [];
    const name = rest.trim().replace(/^"|"$/g, '');
    if (!isLocalDate(date) || name === '') {
      const message = `must have lines like “2026-12-25, Christmas Day”; line ${at + 1} is “${trimmed.slice(0, 60)}”`;
      throw invalidFields([{ field: 'items', message }]);
    }
    return [{ date, name }];
  });
  return { items };
}

/** The text that is read back as the same dates. */
export function linesOfHolidays(items: readonly { date: string; name: string }[]): string {
  return items.map(({ date, name }) => `${date}, ${name}`).join('\n');
}
