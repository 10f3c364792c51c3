import { invalidFields } from '#lib/http/problem';
import { parseUrlInstant } from '#lib/time/urlPeriod';

/** Epoch seconds of a time as typed, local to `zone` unless it carries an offset. @throws {Problem} 422 */
export function typedSec(text: string | undefined, zone: string, field: string): number {
  const sec = parseUrlInstant(text ?? '', zone);
  if (sec === null) {
    throw invalidFields([{ field, message: 'must be a date and time such as 2026-03-17T14:30' }]);
  }
  return sec;
}
