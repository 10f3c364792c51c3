/** What a column holds; instants are RFC 3339 UTC. */
export type ColumnType = 'text' | 'number' | 'integer' | 'boolean' | 'instant' | 'date';

/** How a number is shown where a program shows it; the cell itself is unrounded. */
export type ColumnUnit = 'dB' | 'share' | 's' | 'Hz' | 'm/s' | '°' | 'm' | 'count' | null;

/** A value of a cell; null: none, never 0. */
export type TableCell = string | number | boolean | null;

/** A column of a topic’s table. */
export interface Column<Row> {
  /** Name in the files: stable, lower case. */
  name: string;
  type: ColumnType;
  unit: ColumnUnit;
  /** Meaning in a sentence. */
  description: string;
  cell: (row: Row) => TableCell;
}

/** One topic of a month as a table: a sheet of the workbook and a file of the CSV. */
export interface TopicTable {
  name: string;
  title: string;
  description: string;
  columns: Omit<Column<never>, 'cell'>[];
  /** Names of the columns that tell its rows apart. */
  key: string[];
  rows: TableCell[][];
}

/** A table of some rows. */
export function topicTable<Row>(
  head: Pick<TopicTable, 'name' | 'title' | 'description' | 'key'>,
  columns: readonly Column<Row>[],
  rows: readonly Row[],
): TopicTable {
  return {
    ...head,
    columns: columns.map(({ name, type, unit, description }) => ({ name, type, unit, description })),
    rows: rows.map((row) => columns.map(({ cell }) => cell(row))),
  };
}

type Make<Row> = (
  name: string,
  description: string,
  cell: (row: Row) => TableCell | undefined,
) => Column<Row>;

/** Columns of one type and unit, made by name, meaning and cell. */
function maker(type: ColumnType, unit: ColumnUnit) {
  return <Row>(...[name, description, cell]: Parameters<Make<Row>>): Column<Row> => ({
    name,
    type,
    unit,
    description,
    cell: (row) => cell(row) ?? null,
  });
}

export const text = maker('text', null);
export const level = maker('number', 'dB');
export const share = maker('number', 'share');
export const seconds = maker('integer', 's');
export const count = maker('integer', 'count');
export const hertz = maker('number', 'Hz');
export const truth = maker('boolean', null);
export const instant = maker('instant', null);
export const date = maker('date', null);
export const plainNumber = maker('number', null);
export const speed = maker('number', 'm/s');
export const degrees = maker('number', '°');
export const metres = maker('number', 'm');
