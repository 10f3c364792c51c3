import { parseInstant } from '#lib/contracts/common';

/** Epoch seconds of an instant that our own evidence carries. @throws {RangeError} for any other text. */
export function instantSec(instant: string): number {
  const seconds = parseInstant(instant);
  if (seconds === null) throw new RangeError(`${instant} is not an instant.`);
  return seconds;
}
