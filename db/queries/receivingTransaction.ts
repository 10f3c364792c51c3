import mysql from 'mysql2';
import { receivingPool } from '../receiving';
import { enterGate } from '../sharding/linkGate';
import {
  insertionText,
  isDataServerGone,
  isLockConflict,
  isLockWaitOver,
  MOST_ATTEMPTS,
  pauseBefore,
  type Binding,
  type Insertion,
  type Writes,
} from './connection';

/** Rows of one SELECT, each an array of cells. */
export type Cells = unknown[][];

/**
 * A transaction in two journeys: what it reads in one (begin, locks, rows), and all that it writes, with its commit, in the other.
 * Everything is durable when the promise resolves. A lock that stands in the way starts it again, and so does a data server that was gone:
 * what was stored nevertheless is found stored.
 * `decide` gets the rows of each of `reads` and may only write. With `waitsOnce`, a lock that was not granted in time is not asked for again.
 */
export async function inReceivingTransaction<T>(
  reads: readonly string[],
  decide: (rows: Cells[], writes: Writes) => Promise<T>,
  { waitsOnce = false } = {},
): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await attemptOnce(reads, decide);
    } catch (error) {
      if (waitsOnce && isLockWaitOver(error)) throw error;
      if (attempt === MOST_ATTEMPTS || !(isLockConflict(error) || isDataServerGone(error))) throw error;
      await pauseBefore(attempt);
    }
  }
}

async function attemptOnce<T>(
  reads: readonly string[],
  decide: (rows: Cells[], writes: Writes) => Promise<T>,
): Promise<T> {
  const connection = await acquire();
  let decided: PromiseSettledResult<T>;
  try {
    const begin = ['START TRANSACTION', ...enterGate()];
    const rows = await run(connection, [...begin, ...reads]);
    const writes = new Collected();
    [decided] = await Promise.allSettled([decide(rows.slice(begin.length) as Cells[], writes)]);
    await run(connection, decided.status === 'fulfilled' ? [...writes.statements, 'COMMIT'] : ['ROLLBACK']);
  } catch (error) {
    // Whatever state it is in, the server rolls back what a connection that ends has not committed.
    connection.destroy();
    throw error;
  }
  connection.release();
  if (decided.status === 'rejected') throw decided.reason;
  return decided.value;
}

/**
 * Rows are added to a statement up to here, and statements to a packet: longer strings than 128 kB lie in memory of their own, which costs
 * more to get than a further journey with what they hold.
 */
const MOST_COLLECTED_CHARS = 56 * 1024;
const MOST_PACKET_CHARS = 2 * MOST_COLLECTED_CHARS;

/** Statements to send at once, the rows of one table in one of them. */
class Collected implements Writes {
  private readonly others: string[] = [];
  private readonly insertions = new Map<
    string,
    { head: string; tail: string; rows: string[]; chars: number }[]
  >();

  raw(sql: string, bindings?: readonly Binding[]): PromiseLike<void> {
    this.others.push(format(sql, bindings));
    return Promise.resolve();
  }

  collect({ head, rows, tail = '', bindings }: Insertion): void {
    const kind = `${head} ${tail}`;
    const ofKind = this.insertions.get(kind) ?? [];
    this.insertions.set(kind, ofKind);
    for (const row of bindings ? [format(rows.join(', '), bindings)] : rows) {
      let last = ofKind.at(-1);
      if (!last || last.chars + row.length > MOST_COLLECTED_CHARS) {
        last = { head, tail, rows: [], chars: 0 };
        ofKind.push(last);
      }
      last.rows.push(row);
      last.chars += row.length;
    }
  }

  get statements(): string[] {
    return [...[...this.insertions.values()].flat().map(insertionText), ...this.others];
  }
}

function format(sql: string, bindings: readonly Binding[] | undefined): string {
  return bindings ? mysql.format(sql, [...bindings], false, 'Z') : sql;
}

function acquire(): Promise<mysql.PoolConnection> {
  return new Promise((resolve, reject) => {
    receivingPool().getConnection((error, connection) => (error ? reject(error) : resolve(connection)));
  });
}

/** What each of some statements answers; the first that fails ends them all. Large posts need more than one journey. */
async function run(connection: mysql.PoolConnection, statements: readonly string[]): Promise<unknown[]> {
  const answers: unknown[] = [];
  let packet: string[] = [];
  let chars = 0;
  for (const statement of statements) {
    if (chars + statement.length > MOST_PACKET_CHARS && packet.length > 0) {
      answers.push(...(await send(connection, packet)));
      [packet, chars] = [[], 0];
    }
    packet.push(statement);
    chars += statement.length;
  }
  return [...answers, ...(await send(connection, packet))];
}

function send(connection: mysql.PoolConnection, statements: readonly string[]): Promise<unknown[]> {
  return new Promise((resolve, reject) => {
    connection.query({ sql: statements.join(';\n'), rowsAsArray: true }, (error, results) => {
      if (error) reject(error);
      else resolve(statements.length === 1 ? [results] : (results as unknown[]));
    });
  });
}
