import { watchStations } from '#ingest/health/watch';

/** Judges every station's health; nothing is left to do at once, whatever it found. */
export async function watchHealth(now: Date): Promise<number> {
  await watchStations(now);
  return 0;
}
