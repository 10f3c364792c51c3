import { watchIssuedMonths } from '#ingest/summaries/watchMonths';

/** Looks whether the figures of issued months would be others by now. @returns how many were compared. */
export function watchSummaries(now: Date): Promise<number> {
  return watchIssuedMonths(now);
}
