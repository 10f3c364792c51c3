import { type DiskSample } from '#db/queries/diskSamples';

const DAY_MS = 86_400_000;
/** A line through less says nothing. */
const SHORTEST_MS = 3 * DAY_MS;
/** Beyond this nobody can tell. */
const LONGEST_DAYS = 3650;

/** How full the disk is, and when it will be full if things go on like this. */
export interface DiskForecast {
  totalBytes: number;
  freeBytes: number;
  /** What is written a day, by the samples of the last weeks; null before there are three days of them. */
  bytesADay: number | null;
  /** Null: not within ten years, or not known yet. */
  daysLeft: number | null;
}

/** Forecast from samples, oldest first: a straight line through what was used (least squares). Null without any. */
export function diskForecast(
  samples: readonly Omit<DiskSample, 'databaseBytes' | 'isLow'>[],
): DiskForecast | null {
  const [first, last] = [samples[0], samples.at(-1)];
  if (!first || !last) return null;
  const { totalBytes, freeBytes } = last;
  if (last.takenAt.getTime() - first.takenAt.getTime() < SHORTEST_MS) {
    return { totalBytes, freeBytes, bytesADay: null, daysLeft: null };
  }
  const bytesADay = slopeOf(
    samples.map(({ takenAt, totalBytes: total, freeBytes: free }) => [
      (takenAt.getTime() - first.takenAt.getTime()) / DAY_MS,
      total - free,
    ]),
  );
  const days = bytesADay > 0 ? freeBytes / bytesADay : Infinity;
  return { totalBytes, freeBytes, bytesADay, daysLeft: days <= LONGEST_DAYS ? days : null };
}

/** Slope of the line through points that lies closest to them. */
function slopeOf(points: readonly (readonly [x: number, y: number])[]): number {
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const [meanX, meanY] = [mean(points.map(([x]) => x)), mean(points.map(([, y]) => y))];
  let [covariance, variance] = [0, 0];
  for (const [x, y] of points) {
    covariance += (x - meanX) * (y - meanY);
    variance += (x - meanX) ** 2;
  }
  return variance === 0 ? 0 : covariance / variance;
}
