import { Problem } from '#lib/http/problem';

/** The refusal of a try that has to wait; `kept` says what became of what was asked. */
export function tooManyAttempts(retryAfterSec: number, kept: string): Problem {
  const wait = retryAfterSec < 90 ? `${retryAfterSec} s` : `${Math.ceil(retryAfterSec / 60)} min`;
  return new Problem(
    429,
    'too-many-attempts',
    'Too many attempts',
    `Too many attempts. Try again in ${wait}. ${kept}`,
    { headers: { 'Retry-After': String(retryAfterSec) } },
  );
}
