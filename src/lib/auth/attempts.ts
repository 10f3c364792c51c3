const WINDOW_MS = 15 * 60_000;
const MOST_ATTEMPTS = 10;
const MOST_KEYS = 10_000;

const attempts = new Map<string, number[]>();

/**
 * Counts a sign-in attempt.
 * @returns 0 when it may go on, else the seconds until the next one may.
 */
export function allowAttempt(key: string, nowMs: number): number {
  const recent = (attempts.get(key) ?? []).filter((at) => at > nowMs - WINDOW_MS);
  const [oldest] = recent;
  if (oldest !== undefined && recent.length >= MOST_ATTEMPTS) {
    attempts.set(key, recent);
    return Math.ceil((oldest + WINDOW_MS - nowMs) / 1000);
  }
  if (!attempts.has(key) && attempts.size >= MOST_KEYS) dropOldest();
  attempts.set(key, [...recent, nowMs]);
  return 0;
}

/** A success clears the count. */
export function forgetAttempts(key: string): void {
  attempts.delete(key);
}

function dropOldest(): void {
  const [first] = attempts.keys();
  if (first !== undefined) attempts.delete(first);
}
