import type { MastWeather } from './validity';

/** What a mast noted over a stretch of time: half-open, epoch seconds. */
export interface WeatherRecord {
  startSec: number;
  durationSec: number;
  /** Mean wind speed, m/s. */
  windSpeedMs: number;
  /** Where the wind came from, degrees clockwise of north; null: not told. */
  windDirectionDeg: number | null;
  /** Rain that fell, mm; null: no gauge. */
  rainMm: number | null;
}

/**
 * Weather of `fromSec <= t < toSec` by a mast's records (ascending, disjoint): wind is the duration-weighted mean of those that
 * overlap it, rain is said when any of them has some. Where none overlaps, the nearest one speaks that lies less than `maximumAgeSec` away
 * (the earlier of two as near): a mast that reports every ten minutes still tells of the minutes between, and a mast that is
 * silent tells nothing. Null: unknown.
 */
export function weatherDuring(
  records: readonly WeatherRecord[],
  fromSec: number,
  toSec: number,
  maximumAgeSec: number,
): MastWeather | null {
  const first = firstRecordEndingAfter(records, fromSec);
  let seconds = 0;
  let metres = 0;
  let isRaining = false;
  for (let at = first; at < records.length; at += 1) {
    const record = records[at];
    if (!record || record.startSec >= toSec) break;
    const sec = Math.min(record.startSec + record.durationSec, toSec) - Math.max(record.startSec, fromSec);
    seconds += sec;
    metres += record.windSpeedMs * sec;
    isRaining ||= (record.rainMm ?? 0) > 0;
  }
  if (seconds > 0) return { windSpeedMs: toHundredths(metres / seconds), isRaining };
  const nearest = nearestOf(records[first - 1], records[first], fromSec, toSec);
  if (!nearest || nearest.distanceSec >= maximumAgeSec) return null;
  const { windSpeedMs, rainMm } = nearest.record;
  return { windSpeedMs, isRaining: (rainMm ?? 0) > 0 };
}

/** Where the wind of the same stretch comes from, by the same records: the direction of their mean vector; null: not told. */
export function directionDuring(
  records: readonly WeatherRecord[],
  fromSec: number,
  toSec: number,
  maximumAgeSec: number,
): number | null {
  const first = firstRecordEndingAfter(records, fromSec);
  const overlapping: WeatherRecord[] = [];
  for (let at = first; at < records.length; at += 1) {
    const record = records[at];
    if (!record || record.startSec >= toSec) break;
    overlapping.push(record);
  }
  const mean = meanWind(overlapping, { fromSec, toSec });
  if (mean) return mean.directionDeg;
  const nearest = nearestOf(records[first - 1], records[first], fromSec, toSec);
  return nearest && nearest.distanceSec < maximumAgeSec ? nearest.record.windDirectionDeg : null;
}

/** Index of the first of some ascending, disjoint records that ends after an instant. */
export function firstRecordEndingAfter(records: readonly WeatherRecord[], sec: number): number {
  let low = 0;
  let high = records.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    const record = records[middle];
    if (record && record.startSec + record.durationSec <= sec) low = middle + 1;
    else high = middle;
  }
  return low;
}

function nearestOf(
  before: WeatherRecord | undefined,
  after: WeatherRecord | undefined,
  fromSec: number,
  toSec: number,
): { record: WeatherRecord; distanceSec: number } | null {
  const sinceSec = before ? fromSec - (before.startSec + before.durationSec) : Infinity;
  const untilSec = after ? after.startSec - toSec : Infinity;
  if (before && sinceSec <= untilSec) return { record: before, distanceSec: sinceSec };
  return after ? { record: after, distanceSec: untilSec } : null;
}

/** As stations report it, so that the bound is compared with the same grain. */
function toHundredths(value: number): number {
  return Math.round(value * 100) / 100;
}

/** Mean wind of some records. */
export interface MeanWind {
  seconds: number;
  meanSpeedMs: number;
  maximumSpeedMs: number;
  /** Where the mean wind vector comes from, degrees; null when no record tells a direction or they cancel out. */
  directionDeg: number | null;
}

/** Mean speed by duration, and the direction of the mean vector (speed times seconds), of records clipped to a period; null for none. */
export function meanWind(
  records: readonly WeatherRecord[],
  { fromSec, toSec }: { fromSec: number; toSec: number },
): MeanWind | null {
  let [seconds, metres, east, north, maximum] = [0, 0, 0, 0, 0];
  for (const { startSec, durationSec, windSpeedMs, windDirectionDeg } of records) {
    const sec = Math.min(startSec + durationSec, toSec) - Math.max(startSec, fromSec);
    if (sec <= 0) continue;
    seconds += sec;
    metres += windSpeedMs * sec;
    maximum = Math.max(maximum, windSpeedMs);
    if (windDirectionDeg === null) continue;
    const angle = (windDirectionDeg / 180) * Math.PI;
    east += Math.sin(angle) * windSpeedMs * sec;
    north += Math.cos(angle) * windSpeedMs * sec;
  }
  if (seconds === 0) return null;
  const resultant = Math.hypot(east, north);
  const degrees = (Math.atan2(east, north) / Math.PI) * 180;
  return {
    seconds,
    meanSpeedMs: metres / seconds,
    maximumSpeedMs: maximum,
    directionDeg: resultant > 1e-6 * metres && metres > 0 ? (Math.round(degrees) + 360) % 360 : null,
  };
}
