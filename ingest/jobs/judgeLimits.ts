import { judgeDueWindows } from '#ingest/detect/judge';
import { tellExceedances } from '#ingest/notify/tellExceedances';

/** Judges windows that have closed. @returns how many. */
export function judgeLimits(now: Date): Promise<number> {
  return judgeDueWindows(now, tellExceedances);
}
