import { csvCell } from '#lib/format/csvText';

/**
 * The rows and columns of a table that are shown, as CSV (RFC 4180). A cell's `data-value` stands for it where its text is
 * written for people. Text that a spreadsheet would run as a formula gets an apostrophe; numbers are left alone.
 */
export function csvOfTable(table: HTMLTableElement): string {
  return [...table.rows]
    .filter((row) => !row.hidden)
    .map((row) =>
      [...row.cells]
        .filter((cell) => !cell.hidden)
        .map(cellText)
        .join(','),
    )
    .join('\r\n')
    .concat('\r\n');
}

function cellText(cell: HTMLTableCellElement): string {
  const text = (cell.dataset['value'] ?? cell.dataset['label'] ?? cell.innerText).replace(/\s+/g, ' ').trim();
  const number = text.replace('\u2212', '-');
  if (/^-?\d+(\.\d+)?$/.test(number)) return number;
  return csvCell(text);
}
