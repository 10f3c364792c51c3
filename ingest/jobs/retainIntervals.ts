import { retainIntervals as retain } from '#ingest/retention/retain';

/** Seals and deletes single intervals that are older than their network keeps them. @returns how many rows were deleted. */
export function retainIntervals(now: Date): Promise<number> {
  return retain(now);
}
