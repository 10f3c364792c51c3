import { db } from '#db/client';
import { groupBy } from '#lib/services/groupBy';

/** Id of every planted row, whichever table it is in, so that what refers to another planted row finds it. */
export const PLANTED_ID = 60_001;
/** Stands for names that are part of addresses. */
export const PLANTED = { reference: 'PLANT-2026-0001', code: 'PL-1', month: '2026-02' };

/** What a planted row belongs to. */
export interface Ground {
  networkId: number;
  stationId: number;
  userId: string;
}

interface Column {
  table: string;
  name: string;
  type: string;
  isNullable: 'YES' | 'NO';
  extra: string;
}

/** Tables of everybody, and those that the ground itself has filled. */
const LEFT_OUT =
  /^(schema_migrations(_lock)?|audit_(head|log)|networks|network_settings|stations|station_locks|users|memberships|sessions|job_runs|band_sets|link_gate)$/;

/** Moments that, when set, say that a thing is over. */
const IS_OVER = /^(withdrawn|revoked|retired|ended|disabled|settled|decided|accepted|reversed|finished)_at$/;

/**
 * Puts one row that belongs to a network into every table that can have one, with `mark` in every text.
 * @returns the tables.
 */
export async function plantEverything(ground: Ground, mark: string): Promise<string[]> {
  const jsonColumns = await listJsonColumns();
  const tables = groupBy(await listColumns(), ({ table }) => table);
  const planted: string[] = [];
  for (const [table, columns] of tables) {
    if (LEFT_OUT.test(table)) continue;
    const filled = columns.filter(
      ({ extra, name, isNullable }) =>
        !/GENERATED/.test(extra) && !(isNullable === 'YES' && IS_OVER.test(name)),
    );
    const row = Object.fromEntries(
      filled.map((column) => [column.name, valueFor(column, jsonColumns, ground, mark)]),
    );
    await db()(table).insert(row);
    planted.push(table);
  }
  return planted;
}

function valueFor({ table, name, type }: Column, json: Set<string>, ground: Ground, mark: string): unknown {
  if (name === 'network_id') return ground.networkId;
  if (name === 'station_id' || name === 'nearest_station_id') return ground.stationId;
  if (name === 'station_ids') return JSON.stringify([ground.stationId]);
  if (json.has(`${table}.${name}`)) return JSON.stringify([mark]);
  if (name === 'month') return PLANTED.month;
  if (name === 'reference') return PLANTED.reference;
  if (name === 'code' && table === 'masts') return PLANTED.code;
  const [, kind = '', size = ''] = /^(\w+)(?:\(([^)]*)\))?/.exec(type) ?? [];
  if (kind === 'enum') return size.split(',')[0]?.replace(/'/g, '');
  if (kind === 'char' && size === '36') return ground.userId;
  if (/^(var)?binary$/.test(kind)) return Buffer.alloc(Number(size), mark);
  if (/blob$/.test(kind)) return Buffer.from(mark);
  if (/char$|text$/.test(kind)) return `${mark} ${name}`.slice(0, Number(size) || undefined);
  if (/^date(time)?$|^timestamp$/.test(kind)) return new Date('2026-02-10T12:00:00Z');
  if (/(^|_)(at|from|to|sec)$/.test(name) && kind === 'int') return Date.parse('2026-02-10T12:00:00Z') / 1000;
  if (kind === 'tinyint') return 1;
  return /^id$|_id$/.test(name) ? PLANTED_ID : 1;
}

async function listColumns(): Promise<Column[]> {
  const [columns] = await db().raw(
    `SELECT table_name AS \`table\`, column_name AS name, column_type AS type, is_nullable AS isNullable, extra
       FROM information_schema.columns WHERE table_schema = DATABASE() ORDER BY table_name, ordinal_position`,
  );
  return columns as Column[];
}

/** Names of the columns that hold JSON, as `table.column`. */
async function listJsonColumns(): Promise<Set<string>> {
  const [checks] = await db().raw(
    `SELECT table_name AS \`table\`, check_clause AS clause FROM information_schema.check_constraints
       WHERE constraint_schema = DATABASE()`,
  );
  const names = (checks as { table: string; clause: string }[]).flatMap(({ table, clause }) => {
    const column = /json_valid\(`(\w+)`\)/.exec(clause)?.[1];
    return column === undefined ? [] : [`${table}.${column}`];
  });
  return new Set(names);
}
