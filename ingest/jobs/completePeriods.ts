import { completePeriods } from '#ingest/aggregate/completePeriods';

/** Has the periods of day that have ended since computed, each once. */
export async function completeEndedPeriods(now: Date): Promise<string> {
  return `${await completePeriods(now)} periods`;
}
