import { setTimeout as sleep } from 'node:timers/promises';
import mysql, { type RowDataPacket } from 'mysql2/promise';
import type { Instance } from './instance';

const POLL_MS = 1_000;

/** Answers rows of the soak's server. Each question has a connection of its own, because the server may have been killed meanwhile. */
export async function rowsOf(instance: Instance, statement: string): Promise<Record<string, unknown>[]> {
  const connection = await mysql.createConnection({
    host: '127.0.0.1',
    port: instance.databasePort,
    user: 'bittern',
    password: 'soak',
    timezone: 'Z',
    dateStrings: true,
    supportBigNumbers: true,
  });
  try {
    const [rows] = await connection.query<RowDataPacket[]>(statement);
    return rows;
  } finally {
    await connection.end();
  }
}

/** Waits until nothing of a database waits for the worker. @throws when it still does after `timeoutMs`. */
export async function untilDrained(
  instance: Instance,
  databaseName: string,
  timeoutMs: number,
  signal: AbortSignal,
): Promise<void> {
  const deadline = Date.now() + timeoutMs;
  for (;;) {
    const [row] = await rowsOf(
      instance,
      `SELECT (SELECT COUNT(*) FROM ${databaseName}.dirty_marks) AS marks,
              (SELECT COUNT(*) FROM ${databaseName}.pending_windows) AS windows`,
    );
    const [marks, windows] = [Number(row?.['marks']), Number(row?.['windows'])];
    if (marks === 0 && windows === 0) return;
    if (signal.aborted) return;
    if (Date.now() > deadline) {
      throw new Error(`Still waiting after ${timeoutMs / 1000} s: ${marks} marks, ${windows} windows.`);
    }
    await sleep(POLL_MS, undefined, { signal }).catch(() => undefined);
  }
}
