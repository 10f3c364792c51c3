import type { NewQuarantined } from '#db/queries/quarantine';
import { parseInstant } from '#lib/contracts/common';
import type { Refused } from './readRecords';

/** A refused record as it is kept for the operator. */
export type KeptRecord = NewQuarantined;

/** Many times a real record's length: a few posts of nonsense must not fill the disk. */
const MOST_CHARS = 16_384;
const LATEST_SEC = 4_294_967_295;

/** What to keep of a refused record; null when it is too long, or nested too deeply, to be one. */
export function keptRecord(
  { refusal: { code, detail } }: Refused,
  interval: unknown,
  bands: readonly number[],
): KeptRecord | null {
  const record = jsonOf({ bands, interval });
  if (record === null || record.length > MOST_CHARS) return null;
  return { code, detail, record, startSec: startOf(interval) };
}

function jsonOf(value: unknown): string | null {
  try {
    return JSON.stringify(value);
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** When a refused record claims to begin, so that it can be found by time; null when it does not tell. */
function startOf(interval: unknown): number | null {
  const start: unknown = (interval as { start?: unknown } | null)?.start;
  const sec = typeof start === 'string' ? parseInstant(start) : null;
  return sec === null || sec < 0 || sec > LATEST_SEC ? null : Math.floor(sec);
}
