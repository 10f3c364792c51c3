import { AsyncLocalStorage } from 'node:async_hooks';
import type { Knex } from 'knex';
import { db } from '../client';
import { enterGate } from '../sharding/linkGate';

/** What every query runs on: the pool, or a transaction that the caller has opened. */
export type Connection = Knex | Knex.Transaction;

/**
 * What a write runs on whose answer nobody needs: any connection, or `inReceivingTransaction`, which sends all of them at once.
 */
export interface Writes {
  raw(sql: string, bindings?: readonly Binding[]): PromiseLike<unknown>;
  /** Takes rows to insert with those of other posts; without it they go by themselves. */
  collect?(insertion: Insertion): void;
}

/** Rows to insert, and the same text before and after all that may go in one statement. They are independent of other tables' rows. */
export interface Insertion {
  head: string;
  /** Each a list of cells in brackets, the placeholders of `bindings` among them. */
  rows: readonly string[];
  tail?: string;
  bindings?: readonly Binding[];
}

/** Inserts rows, at once or with what else is collected. */
export async function insertRows(conn: Writes, insertion: Insertion): Promise<void> {
  if (conn.collect) conn.collect(insertion);
  else await conn.raw(insertionText(insertion), insertion.bindings);
}

/** The statement that inserts them. */
export function insertionText({ head, rows, tail = '' }: Insertion): string {
  return `${head} VALUES ${rows.join(', ')} ${tail}`;
}

export type Binding = string | number | Date | Buffer | null;

const reading = new AsyncLocalStorage<Knex>();

/** The pool itself, the default of every query's last parameter; within `readingFrom` that of the replica. */
export function pool(): Connection {
  return reading.getStore() ?? db();
}

/** Runs `work`, which only reads, with another pool in place of ours. Transactions stay where they are. */
export function readingFrom<T>(other: Knex, work: () => Promise<T>): Promise<T> {
  return reading.run(other, work);
}

/** Locks that wait for each other; also, at COMMIT, another node of the head that was first with the same row. */
const DEADLOCK = 1213;
const LOCK_WAIT_TIMEOUT = 1205;
/** A node of the head that has no majority, or is only coming. */
const NODE_NOT_READY = 1047;
/** A data server is gone, was gone when its connection was used last, or cannot be reached. */
const DATA_SERVER_GONE = new Set([12701, 1429, 1430]);
const NO_SUCH_TABLE = 1146;
const BUCKET_IS_NOT_THERE = /_\d\d' doesn't exist/;
export const MOST_ATTEMPTS = 4;

/**
 * Runs `work` in one transaction: all of it is durable when the promise resolves, none of it when it rejects.
 * A deadlock or a lock that is not granted in time starts the work again, so `work` must have no other effects.
 */
export function inTransaction<T>(
  work: (transaction: Knex.Transaction) => Promise<T>,
  settings: Pick<Knex.TransactionConfig, 'isolationLevel'> = {},
): Promise<T> {
  return repeatedly(() =>
    db().transaction(async (transaction) => {
      for (const statement of enterGate()) await transaction.raw(statement);
      return work(transaction);
    }, settings),
  );
}

/**
 * Runs `work`, which only reads, as of one moment; within `readingFrom` of what that reads from. What a conflict broke off begins again.
 * On a cluster each data server's moment is that of its first answer.
 */
export function inSnapshot<T>(work: (snapshot: Knex.Transaction) => Promise<T>): Promise<T> {
  // “Repeatable read” is the server's default; Knex cannot ask for both in MariaDB's words.
  return repeatedly(() => pool().transaction(work, { readOnly: true }));
}

async function repeatedly<T>(once: () => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await once();
    } catch (error) {
      if (attempt === MOST_ATTEMPTS || !mayBeDoneAgain(error)) throw error;
      await pauseBefore(attempt);
    }
  }
}

/** A commit that a data server failed may have taken effect elsewhere: what has other effects is not done a second time. */
function mayBeDoneAgain(error: unknown): boolean {
  const isOfCommit = /^COMMIT\b/i.test((error as { sql?: string }).sql ?? '');
  return isLockConflict(error) || (isDataServerGone(error) && !isOfCommit);
}

/** Whether an error says that a lock or another node stood in the way: nothing was done, and doing all of it again may succeed. */
export function isLockConflict(error: unknown): boolean {
  const errno = (error as { errno?: number }).errno;
  return errno === DEADLOCK || errno === LOCK_WAIT_TIMEOUT || errno === NODE_NOT_READY;
}

/** Whether an error says that a lock was not granted in time. */
export function isLockWaitOver(error: unknown): boolean {
  return (error as { errno?: number }).errno === LOCK_WAIT_TIMEOUT;
}

/** Whether an error says that a data server was not reached, or that a bucket has just moved to another. */
export function isDataServerGone(error: unknown): boolean {
  const { errno = 0, message = '' } = error as { errno?: number; message?: string };
  return DATA_SERVER_GONE.has(errno) || (errno === NO_SUCH_TABLE && BUCKET_IS_NOT_THERE.test(message));
}

/** Whether an error says that the connection is gone or never came to be, so that others would meet the same. */
export function isConnectionLost(error: unknown): boolean {
  return (error as { fatal?: boolean }).fatal === true;
}

/** Waits longer from attempt to attempt. */
export function pauseBefore(attempt: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 10 * 4 ** attempt * (0.5 + attempt / 8)));
}
