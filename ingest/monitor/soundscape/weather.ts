import { localClockAt } from './clock';
import { smoothNoise } from './noise';

export interface Weather {
  windSpeedMs: number;
  windDirectionDeg: number;
  temperatureC: number;
  isRaining: boolean;
}

const HOUR_SEC = 3600;

/** Invented weather of the estuary: westerlies, a gale every week or so, showers with the fronts. */
export function weatherAt(epochSec: number): Weather {
  const { hour } = localClockAt(epochSec);
  const front = smoothNoise(11, epochSec, 62 * HOUR_SEC);
  const spell = smoothNoise(12, epochSec, 9 * HOUR_SEC);
  const gust = smoothNoise(13, epochSec, 600);
  const seaBreeze = Math.max(0, Math.sin(((hour - 8) / 12) * Math.PI));
  const mean = 1.7 + 1.3 * spell + 0.9 * seaBreeze + 5.2 * Math.max(0, front - 0.35);
  const season = Math.cos(((epochSec / 86_400 - 200) / 365.25) * 2 * Math.PI);
  return {
    windSpeedMs: Math.max(0.1, mean * (1 + 0.28 * gust)),
    windDirectionDeg: (250 + 70 * smoothNoise(14, epochSec, 30 * HOUR_SEC) + 18 * spell + 360) % 360,
    temperatureC: 10.5 + 6 * season + 3 * seaBreeze - 2 * front + smoothNoise(15, epochSec, 5 * HOUR_SEC),
    isRaining: front > 0.2 && smoothNoise(16, epochSec, 2400) > 0.45,
  };
}
