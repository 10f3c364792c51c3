import writeExcelFile, { type Row, type SheetData } from 'write-excel-file/node';
import { type ColumnType, type ColumnUnit, type TableCell, type TopicTable } from './tables/table';

/** Facts about the file, name and value, for its first sheet. */
export type Facts = readonly (readonly [name: string, value: string])[];

const HEAD = {
  fontWeight: 'bold',
  backgroundColor: '#e8ece6',
  bottomBorderStyle: 'thin',
  bottomBorderColor: '#5c675f',
} as const;
const FORMATS: Partial<Record<NonNullable<ColumnUnit>, string>> = {
  dB: '0.0',
  share: '0.0000',
  'm/s': '0.0',
  s: '0',
  count: '0',
};
const WIDTHS: Record<ColumnType, number> = {
  text: 22,
  number: 12,
  integer: 12,
  boolean: 10,
  instant: 20,
  date: 12,
};

/** A month as a workbook: about the file, a sheet a topic with typed cells, and what every column means. Times are UTC. */
export async function workbook(
  tables: readonly TopicTable[],
  facts: Facts,
  paragraphs: readonly string[],
): Promise<Uint8Array> {
  const about: SheetData = [
    ...facts.map(([name, value]): Row => [
      { value: name, fontWeight: 'bold' },
      { value, type: String },
    ]),
    [],
    ...paragraphs.map((value): Row => [null, { value, type: String, wrap: true }]),
  ];
  const sheets = [
    { data: about, sheet: 'About', columns: [{ width: 26 }, { width: 110 }] },
    ...tables.map((table) => ({
      data: sheetOf(table),
      sheet: table.title,
      columns: table.columns.map(({ type, name }) => ({ width: Math.max(WIDTHS[type], name.length + 1) })),
      stickyRowsCount: 1,
    })),
    {
      data: columnsSheet(tables),
      sheet: 'Columns',
      columns: [{ width: 22 }, { width: 30 }, { width: 10 }, { width: 90 }],
      stickyRowsCount: 1,
    },
  ];
  return writeExcelFile(sheets, { fontFamily: 'Noto Sans', fontSize: 10 }).toBuffer();
}

function sheetOf({ columns, rows }: TopicTable): SheetData {
  const heads: Row = columns.map(({ name }) => ({ value: name, ...HEAD }));
  const cellsOf = columns.map(cellMaker);
  const cells = rows.map((row): Row => row.map((value, at) => cellsOf[at]?.(value) ?? null));
  return [heads, ...cells];
}

/** Makes the cells of a column. But for levels they come again and again, and are then the same cell: it takes a fifth of the memory. */
function cellMaker(column: TopicTable['columns'][number]): (value: TableCell) => Row[number] {
  if (column.type === 'number' && column.unit === 'dB') return (value) => cellOf(value, column);
  const known = new Map<TableCell, Row[number]>();
  return (value) => {
    const cell = known.get(value) ?? cellOf(value, column);
    known.set(value, cell);
    return cell;
  };
}

function cellOf(value: TableCell, column: TopicTable['columns'][number]): Row[number] {
  if (value === null) return null;
  const { type, unit } = column;
  if (type === 'instant')
    return { value: new Date(String(value)), type: Date, format: 'yyyy-mm-dd hh:mm:ss' };
  if (type === 'date')
    return { value: new Date(`${String(value)}T00:00:00Z`), type: Date, format: 'yyyy-mm-dd' };
  if (typeof value === 'boolean') return { value, type: Boolean };
  if (typeof value === 'string') return { value, type: String };
  const format = unit === null ? undefined : FORMATS[unit];
  return { value, type: Number, ...(format === undefined ? {} : { format }) };
}

function columnsSheet(tables: readonly TopicTable[]): SheetData {
  const heads: Row = ['sheet', 'column', 'unit', 'meaning'].map((value) => ({ value, ...HEAD }));
  const rows = tables.flatMap(({ title, columns }) =>
    columns.map(({ name, unit, description }): Row => [title, name, unit, description]),
  );
  return [heads, ...rows];
}
