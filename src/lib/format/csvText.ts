/** A cell: text, number, truth, or nothing. */
export type Cell = string | number | boolean | null;

/** What spreadsheets begin formulas with; some also by the wide forms of East Asian keyboards. */
const FORMULA_START = /^[=+\-@\t\r\n\0＝＋－＠]/;

/**
 * Lines of a CSV file by RFC 4180, CRLF after each. Text that a spreadsheet would take for a formula gets an apostrophe
 * before it; numbers are left alone, negative ones too.
 */
export function csvText(rows: readonly (readonly Cell[])[]): string {
  return rows.map((row) => `${row.map(csvCell).join(',')}\r\n`).join('');
}

/** One cell, quoted where it must be. */
export function csvCell(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell !== 'string') return String(cell);
  const text = FORMULA_START.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
