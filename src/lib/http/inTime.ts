import { Problem } from './problem';

const LONGEST_MS = 30_000;

/**
 * What a promise comes to, if it does in time. A database that hangs neither answers nor fails: whoever waits is told to try again,
 * while what was begun goes on.
 * @throws {Problem} 503
 */
export async function inTime<T>(work: Promise<T>, longestMs = LONGEST_MS): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(tooSlow()), longestMs);
  });
  try {
    return await Promise.race([work, late]);
  } finally {
    clearTimeout(timer);
  }
}

function tooSlow(): Problem {
  return new Problem(
    503,
    'database-slow',
    'Not possible at the moment',
    'It could not be made durable in time. Keep the records and try again.',
    { headers: { 'Retry-After': '10' } },
  );
}
