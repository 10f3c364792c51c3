import { failureWords } from './failureWords';

interface LoggedError {
  type: string;
  message: string;
  code?: string | number;
  stack?: string;
  causes?: LoggedError[];
}

const MOST_CAUSES = 5;

/** What the log tells of an error: where it arose and what it is, without the values that a statement was given. */
export function loggedError(error: unknown): LoggedError {
  if (!(error instanceof Error)) return { type: typeof error, message: failureWords(error) };
  const { code, errno } = error as Error & { code?: string; errno?: number };
  const inner = error instanceof AggregateError ? error.errors : error.cause ? [error.cause] : [];
  const frames = error.stack?.split('\n').filter((line) => /^\s+at /.test(line));
  return {
    type: error.name,
    message: failureWords(error),
    ...((code ?? errno) === undefined ? {} : { code: code ?? errno }),
    ...(frames && frames.length > 0 ? { stack: frames.join('\n') } : {}),
    ...(inner.length === 0 ? {} : { causes: inner.slice(0, MOST_CAUSES).map(loggedError) }),
  };
}
