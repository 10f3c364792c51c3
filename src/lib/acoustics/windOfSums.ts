import { type MeanWind } from './mastWeather';

/** Wind over some seconds, added up: speed times seconds, and its parts to the east and north where a direction is told. */
export interface WindSums {
  seconds: number;
  metres: number;
  maximumMs: number;
  east: number;
  north: number;
}

/** Mean wind of such sums, as `meanWind` gives it of single records; null without any seconds. */
export function windOfSums({ seconds, metres, maximumMs, east, north }: WindSums): MeanWind | null {
  if (seconds === 0) return null;
  const hasDirection = metres > 0 && Math.hypot(east, north) > 1e-6 * metres;
  const degrees = Math.round((Math.atan2(east, north) / Math.PI) * 180);
  return {
    seconds,
    meanSpeedMs: metres / seconds,
    maximumSpeedMs: maximumMs,
    directionDeg: hasDirection ? (degrees + 360) % 360 : null,
  };
}
