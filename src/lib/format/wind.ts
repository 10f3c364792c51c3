const POINTS = 'N NNE NE ENE E ESE SE SSE S SSW SW WSW W WNW NW NNW'.split(' ');

/** `from WSW (248°)`; null: a direction that nobody tells. */
export function formatDirection(degrees: number | null): string {
  if (degrees === null) return 'direction not told';
  const point = POINTS[Math.round(degrees / 22.5) % POINTS.length] ?? '';
  return `from ${point} (${Math.round(degrees) % 360}°)`;
}

/** `4.2 m/s`. */
export function formatSpeed(metresPerSec: number): string {
  return `${metresPerSec.toFixed(1)} m/s`;
}
