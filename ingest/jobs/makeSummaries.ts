import { makeWaitingMonth } from '#ingest/summaries/draftMonths';

/** Makes the figures of drafts, and the files of months that somebody issues. @returns how many. */
export function makeSummaries(now: Date): Promise<number> {
  return makeWaitingMonth(now);
}
