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

/** A part's week as SQL, of a row that `row` stands before (`NEW.`, `OLD.` or nothing). */
const weekText = (kind: Kind, row = '') => (TIMED.includes(kind) ? `${row}starts_at DIV ${WEEK_SEC}` : '0');

/**
 * Begins to note, on the server that has a bucket, which of its parts have yet to be copied: all of them, and from now on each that changes.
 * Begun before and broken off, it goes on with what it knows.
 */
export async function beginQueue(source: Connection, bucket: number): Promise<void> {
  const queue = queueTable(bucket);
  const [tables] = await source.query<RowDataPacket[]>('SHOW TABLES LIKE ?', [`${queue}\\_ready`]);
  if (tables.length > 0) return;
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
      await source.query(`CREATE OR REPLACE TRIGGER moving_${kind}_${bucket}_${event} AFTER ${event} ON ${table} FOR EACH ROW
        ${noteText(queue, kind, row)}`);
    // A row that is moved in time leaves its old week, too.
    if (TIMED.includes(kind))
      await source.query(`CREATE OR REPLACE TRIGGER moving_${kind}_${bucket}_LEFT BEFORE UPDATE ON ${table} FOR EACH ROW
        ${noteText(queue, kind, 'OLD.')}`);
    await source.query(
      `INSERT IGNORE INTO ${queue} (kind, station_id, week) SELECT DISTINCT '${kind}', station_id, ${weekText(kind)} FROM ${table}`,
    );
  }
  await source.query(`CREATE TABLE ${queue}_ready (id INT) ENGINE = InnoDB`);
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
  return `DROP TABLE IF EXISTS ${[...tables, queueTable(bucket), `${queueTable(bucket)}_ready`].join(', ')}`;
}

/** What a bucket's table is called once nobody shall find it. */
export function leftTable(kind: Kind, bucket: number): string {
  return `left_${bucketTable(kind, bucket)}`;
}
