import { watchDrift } from '#ingest/health/watchDrift';

/** Judges, once a day, whether any station's microphone seems to go off. */
export async function watchDrifts(now: Date): Promise<string> {
  return `${await watchDrift(now)} changes`;
}
