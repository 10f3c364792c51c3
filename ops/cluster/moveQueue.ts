import type { Connection, RowDataPacket } from 'mysql2/promise';
import { bucketTable, KINDS, type Kind } from '#db/sharding/kinds';

/** Tables whose rows have a time are copied week by week, others a station at once. */
const WEEK_SEC = 7 * 86_400;
const TIMED: readonly Kind[] = [
  'interval_levels',
  'quarter_hours',
  'station_day_traces',
  'clock_shift_starts',
];

/** Rows of one kind that are copied together: a station's, of one week where they have a time. */
export interface Part {
  kind: Kind;
  stationId: number;
  week: number;
  /** Grows with each change of its rows. */
  version: number;
}

const queueTable = (bucket: number) => `moving_${String(bucket).padStart(2, '0')}`;

/** Is there once all parts are in the queue; its comment names the server they go to. */
const readyTable = (bucket: number) => `${queueTable(bucket)}_ready`;

const noter = (kind: Kind, bucket: number, event: string) => `moving_${kind}_${bucket}_${event}`;

/** A part's week as SQL, of a row that `row` stands before (`NEW.`, `OLD.` or nothing). */
const weekText = (kind: Kind, row = '') => (TIMED.includes(kind) ? `${row}starts_at DIV ${WEEK_SEC}` : '0');

/** The server that a bucket is being moved to by the queue of the one that has it; null where no move has got as far as copying. */
export async function begunFor(source: Connection, bucket: number): Promise<string | null> {
  const [[row]] = await source.query<RowDataPacket[]>(
    'SELECT table_comment AS server FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name = ?',
    [readyTable(bucket)],
  );
  return row ? String(row['server']) : null;
}

/**
 * Begins to note, on the server that has a bucket, which of its parts have yet to be copied to a server: all of them, and from now on each that
 * changes.
 */
export async function beginQueue(source: Connection, bucket: number, to: string): Promise<void> {
  const queue = queueTable(bucket);
  await source.query(`CREATE TABLE IF NOT EXISTS ${queue} (
    kind VARCHAR(30) NOT NULL, station_id INT UNSIGNED NOT NULL, week INT UNSIGNED NOT NULL, version INT UNSIGNED NOT NULL DEFAULT 0,
    PRIMARY KEY (kind, station_id, week)) ENGINE = InnoDB CHARSET = ascii`);
  for (const kind of KINDS) {
    const table = bucketTable(kind, bucket);
    for (const [event, row] of [
      ['INSERT', 'NEW.'],
      ['UPDATE', 'NEW.'],
      ['DELETE', 'OLD.'],
    ] as const)
      await source.query(`CREATE OR REPLACE TRIGGER ${noter(kind, bucket, event)} AFTER ${event} ON ${table} FOR EACH ROW
        ${noteText(queue, kind, row)}`);
    // A row that is moved in time leaves its old week, too.
    if (TIMED.includes(kind))
      await source.query(`CREATE OR REPLACE TRIGGER ${noter(kind, bucket, 'LEFT')} BEFORE UPDATE ON ${table} FOR EACH ROW
        ${noteText(queue, kind, 'OLD.')}`);
    await source.query(
      `INSERT IGNORE INTO ${queue} (kind, station_id, week) SELECT DISTINCT '${kind}', station_id, ${weekText(kind)} FROM ${table}`,
    );
  }
  await source.query(
    `CREATE TABLE ${readyTable(bucket)} (id INT) ENGINE = InnoDB COMMENT = ${source.escape(to)}`,
  );
}

/** Notes nothing any more. That it was begun is forgotten first: broken off here, the next move begins anew. */
export async function endQueue(source: Connection, bucket: number): Promise<void> {
  await source.query(`DROP TABLE IF EXISTS ${readyTable(bucket)}`);
  for (const kind of KINDS)
    for (const event of ['INSERT', 'UPDATE', 'DELETE', 'LEFT'])
      await source.query(`DROP TRIGGER IF EXISTS ${noter(kind, bucket, event)}`);
  await source.query(`DROP TABLE IF EXISTS ${queueTable(bucket)}`);
}

function noteText(queue: string, kind: Kind, row: string): string {
  return `INSERT INTO ${queue} (kind, station_id, week) VALUES ('${kind}', ${row}station_id, ${weekText(kind, row)})
    ON DUPLICATE KEY UPDATE version = version + 1`;
}

/** Some parts that have yet to be copied. */
export async function nextParts(source: Connection, bucket: number, limit: number): Promise<Part[]> {
  const [rows] = await source.query<RowDataPacket[]>(
    `SELECT kind, station_id AS stationId, week, version FROM ${queueTable(bucket)} LIMIT ${limit}`,
  );
  return rows as Part[];
}

/** Takes a part off, unless it has changed since it was looked at; a change that is not committed yet is waited for. */
export async function partDone(source: Connection, bucket: number, part: Part): Promise<void> {
  await source.query(
    `DELETE FROM ${queueTable(bucket)} WHERE kind = ? AND station_id = ? AND week = ? AND version = ?`,
    [part.kind, part.stationId, part.week, part.version],
  );
}

/** The condition that a part's rows meet. */
export function partText({ kind, stationId, week }: Part): string {
  const time = TIMED.includes(kind)
    ? ` AND starts_at >= ${week * WEEK_SEC} AND starts_at < ${(week + 1) * WEEK_SEC}`
    : '';
  return `station_id = ${stationId}${time}`;
}

/** The statement that lets nobody but its connection use a bucket's tables, until that unlocks them or ends. */
export function holdText(bucket: number): string {
  const tables = [...KINDS.map((kind) => bucketTable(kind, bucket)), queueTable(bucket)];
  return `LOCK TABLES ${tables.map((table) => `${table} WRITE`).join(', ')}`;
}

/** The statement that drops what a bucket has left on a server, in or out of reach, and with it what notes changes. */
export function dropBucketText(bucket: number): string {
  const tables = KINDS.flatMap((kind) => [bucketTable(kind, bucket), leftTable(kind, bucket)]);
  return `DROP TABLE IF EXISTS ${[readyTable(bucket), ...tables, queueTable(bucket)].join(', ')}`;
}

/** What a bucket's table is called once nobody shall find it. */
export function leftTable(kind: Kind, bucket: number): string {
  return `left_${bucketTable(kind, bucket)}`;
}
