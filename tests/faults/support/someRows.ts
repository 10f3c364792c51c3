import { db } from '#db/client';

const ROWS_A_TABLE = 2;
const BOOKKEEPING = /^schema_migrations/;

interface Column {
  table: string;
  name: string;
  type: string;
  fullType: string;
  length: number | null;
}

export interface TableRows {
  columns: string[];
  rows: unknown[];
}

/** Puts rows into every table that has none, with values of each column's type that tell the rows apart. */
export async function fillTables(): Promise<void> {
  for (const [table, columns] of await columnsOfTables()) {
    if (await db()(table).first()) continue;
    for (let row = 1; row <= ROWS_A_TABLE; row += 1) {
      await db()(table).insert(
        Object.fromEntries(columns.map((column) => [column.name, valueOf(column, row)])),
      );
    }
  }
}

/** Every table's rows, in the columns that there are but some, or in those of `like`. */
export async function rowsOfTables(
  without: (table: string) => string[],
  like?: ReadonlyMap<string, TableRows>,
): Promise<Map<string, TableRows>> {
  const found = new Map<string, TableRows>();
  const tables = like
    ? [...like].map(([table, { columns }]) => [table, columns] as const)
    : [...(await columnsOfTables())].map(([table, columns]) => {
        const names = columns.map(({ name }) => name).filter((name) => !without(table).includes(name));
        return [table, names] as const;
      });
  for (const [table, columns] of tables) {
    const rows: object[] = await db()(table).select(columns);
    const sorted = rows.map((row) => JSON.stringify(row)).sort();
    found.set(table, { columns, rows: sorted });
  }
  return found;
}

async function columnsOfTables(): Promise<Map<string, Column[]>> {
  const [rows] = (await db().raw(
    `SELECT c.TABLE_NAME AS 'table', c.COLUMN_NAME AS name, c.DATA_TYPE AS type, c.COLUMN_TYPE AS fullType,
       c.CHARACTER_MAXIMUM_LENGTH AS length
     FROM information_schema.COLUMNS c WHERE c.TABLE_SCHEMA = DATABASE() AND c.IS_GENERATED = 'NEVER'
     ORDER BY c.TABLE_NAME, c.ORDINAL_POSITION`,
  )) as [Column[]];
  const byTable = new Map<string, Column[]>();
  for (const column of rows) {
    if (BOOKKEEPING.test(column.table)) continue;
    byTable.set(column.table, [...(byTable.get(column.table) ?? []), column]);
  }
  return byTable;
}

function valueOf({ type, fullType, length, name }: Column, row: number): unknown {
  if (type === 'enum') return /'([^']*)'/.exec(fullType)?.[1];
  if (/int$/.test(type)) return row;
  if (type === 'double' || type === 'float' || type === 'decimal') return row / 2;
  if (type === 'datetime' || type === 'date') return new Date(Date.UTC(2026, 0, row, 12));
  if (/binary$/.test(type)) return Buffer.alloc(Math.min(length ?? 1, 16), row);
  if (/blob$/.test(type)) return Buffer.from([row, 0, 255]);
  // Text that a check may want to be JSON.
  if (/text$/.test(type)) return `[${row}]`;
  return `${row}${name}`.slice(0, length ?? 1);
}
