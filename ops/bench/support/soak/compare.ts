import { rowsOf } from './database';
import type { Instance } from './instance';

interface Compared {
  table: string;
  /** Columns that say when or in which order something came. */
  without: readonly string[];
  /** Columns of which something else is compared, in SQL. */
  instead?: Readonly<Record<string, string>>;
  where?: string;
}

/**
 * Everything that follows from the data alone. Left out: ids, times of receipt and computation, how often a refused record came, and
 * how often a finding was revised on the way; findings that were lifted again, which exist only where the windows were judged
 * half-way. The set of bands goes by its bands, not by its number; how far a clock is ahead depends on when it is asked.
 */
const COMPARED: readonly Compared[] = [
  { table: 'stations', without: ['created_at'] },
  { table: 'interval_levels', without: ['received_at', 'band_set_id', 'import_id'] },
  { table: 'quarter_hours', without: ['computed_at'] },
  { table: 'day_periods', without: ['computed_at'] },
  { table: 'station_latest', without: ['received_at'] },
  {
    table: 'quarantine',
    without: ['id', 'received_at', 'times_received', 'import_id'],
    instead: { detail: "IF(t.code = 'clock-ahead', '', SHA2(t.detail, 256))" },
  },
  {
    table: 'exceedances',
    without: ['id', 'revision', 'detected_at', 'revised_at'],
    where: "state = 'standing'",
  },
];

/** Long types, of which digests are compared. */
const DIGESTED = /text|blob|binary/;
const MOST_SHOWN = 5;

export interface TableResult {
  table: string;
  rows: number;
  onlyHere: Record<string, unknown>[];
  onlyThere: Record<string, unknown>[];
}

/** Compares two databases table by table, every row and every column that counts. Of the rows that differ the first few. */
export async function compareDatabases(
  instance: Instance,
  here: string,
  there: string,
): Promise<TableResult[]> {
  const results: TableResult[] = [];
  for (const one of COMPARED) {
    const [ofHere, ofThere] = [await selectOf(instance, here, one), await selectOf(instance, there, one)];
    const except = (first: string, second: string) =>
      rowsOf(instance, `(${first}) EXCEPT ALL (${second}) LIMIT ${MOST_SHOWN}`);
    const [count] = await rowsOf(instance, `SELECT COUNT(*) AS n FROM (${ofThere}) AS counted`);
    results.push({
      table: one.table,
      rows: Number(count?.['n']),
      onlyHere: await except(ofHere, ofThere),
      onlyThere: await except(ofThere, ofHere),
    });
  }
  return results;
}

async function selectOf(
  instance: Instance,
  database: string,
  { table, without, where, instead = {} }: Compared,
): Promise<string> {
  const columns = await rowsOf(
    instance,
    `SELECT COLUMN_NAME AS name, DATA_TYPE AS type FROM information_schema.COLUMNS
     WHERE TABLE_SCHEMA = '${database}' AND TABLE_NAME = '${table}' ORDER BY ORDINAL_POSITION`,
  );
  const chosen = columns
    .map(({ name, type }) => ({ name: String(name), type: String(type) }))
    .filter(({ name }) => !without.includes(name))
    .map(({ name, type }) => `${instead[name] ?? comparable(`t.${name}`, type)} AS ${name}`);
  if (chosen.length === 0) throw new Error(`There is no table ${table}.`);
  const isByBands = without.includes('band_set_id');
  const bands = isByBands ? ['SHA2(CONCAT(b.fraction, b.band_indices), 256) AS bands'] : [];
  const join = isByBands ? ` JOIN ${database}.band_sets b ON b.id = t.band_set_id` : '';
  return `SELECT ${[...chosen, ...bands].join(', ')} FROM ${database}.${table} t${join}${where ? ` WHERE t.${where}` : ''}`;
}

/** A column as it is compared: letter by letter, whatever its collation makes of case and blanks. */
function comparable(column: string, type: string): string {
  if (DIGESTED.test(type)) return `SHA2(${column}, 256)`;
  return /char/.test(type) ? `CONVERT(${column} USING utf8mb4) COLLATE utf8mb4_nopad_bin` : column;
}
