import { addDueDrafts } from '#ingest/summaries/draftMonths';

/** Drafts the months that have closed and whose days of grace are over. */
export async function draftSummaries(now: Date): Promise<string> {
  return `${await addDueDrafts(now)} drafts`;
}
