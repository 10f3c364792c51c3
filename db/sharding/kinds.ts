/** Stations are shared out by these many buckets. It never changes: a station's rows stand in the table of its bucket. */
export const BUCKETS = 64;

/**
 * Tables that grow with what is measured, and what must be written in one piece with it. Every key of theirs has the station, so that one
 * bucket's rows, their marks and their lock stand together on one server.
 */
export const KINDS = [
  'interval_levels',
  'dirty_marks',
  'station_latest',
  'quarter_hours',
  'day_periods',
  'station_day_traces',
  'clock_shift_starts',
  'station_locks',
] as const;

export type Kind = (typeof KINDS)[number];

/** The bucket of a station. */
export function bucketOf(stationId: number): number {
  return stationId % BUCKETS;
}

/** The table of a bucket on its data server, such as `interval_levels_07`. */
export function bucketTable(kind: Kind, bucket: number): string {
  return `${kind}_${String(bucket).padStart(2, '0')}`;
}
