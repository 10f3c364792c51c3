import { config } from '#lib/config/index';
import { RateLimit } from '#lib/http/rateLimit';
import { tooManyAttempts } from './tooMany';

let pace: RateLimit | undefined;

/** Counts a request of an account, whichever browser or access token it comes by: a script that runs away leaves the others theirs. @throws {Problem} 429 */
export function requireAccountPace(userId: string, nowMs: number): void {
  pace ??= new RateLimit(config().requestsPerMinuteOfAccount);
  const retryAfterSec = pace.take(userId, nowMs);
  if (retryAfterSec > 0) throw tooManyAttempts(retryAfterSec, 'Nothing was changed.');
}
