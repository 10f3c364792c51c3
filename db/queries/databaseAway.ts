import { isDataServerGone } from './connection';

const AWAY_CODES = new Set([
  // Not reached, or gone.
  'ECONNREFUSED',
  'ECONNRESET',
  'ETIMEDOUT',
  'EPIPE',
  'EHOSTUNREACH',
  'ENETUNREACH',
  'EAI_AGAIN',
  'PROTOCOL_CONNECTION_LOST',
  'PROTOCOL_SEQUENCE_TIMEOUT',
  'ER_SERVER_SHUTDOWN',
  'ER_QUERY_INTERRUPTED',
  // Too many connections.
  'ER_CON_COUNT_ERROR',
  'ER_TOO_MANY_USER_CONNECTIONS',
  'ER_USER_LIMIT_REACHED',
  // Full, or out of memory.
  'ER_RECORD_FILE_FULL',
  'ER_DISK_FULL',
  'EE_WRITE',
  'ER_ERROR_ON_WRITE',
  'ER_ERROR_DURING_COMMIT',
  'ER_OUTOFMEMORY',
  'ER_OUT_OF_RESOURCES',
  // Stuck behind others, after all attempts.
  'ER_LOCK_WAIT_TIMEOUT',
  'ER_LOCK_DEADLOCK',
  'ER_LOCK_TABLE_FULL',
  // Read-only.
  'ER_OPTION_PREVENTS_STATEMENT',
  'ER_READ_ONLY_MODE',
  'ER_CANT_EXECUTE_IN_READ_ONLY_TRANSACTION',
]);

/** Errors that the driver has no name for, or a misleading one. */
const AWAY_NUMBERS = new Set([
  // The connection was killed.
  1927,
  // A node of the head is not ready, or lost its majority.
  1047,
  // The connection to a data server broke.
  1158, 1159, 1160, 1161, 2006, 2013,
]);

/** Whether an error says that the database cannot take anything now (away, full, read-only, stuck), not that the request was wrong. */
export function isDatabaseAway(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  const { code, errno, fatal } = error as Error & { code?: string; errno?: number; fatal?: boolean };
  return (
    AWAY_CODES.has(code ?? '') ||
    AWAY_NUMBERS.has(errno ?? 0) ||
    isDataServerGone(error) ||
    fatal === true ||
    error.name === 'KnexTimeoutError' ||
    /Connection lost|closed state|Can't add new command|Unable to acquire a connection|aborted|No space left|error 28\b/.test(
      error.message,
    )
  );
}
