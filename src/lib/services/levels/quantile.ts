/**
 * The `share` (0–1) quantile of some values by linear interpolation between order statistics (Hyndman & Fan's type 7, the
 * default of R and NumPy); null of none.
 */
export function quantile(values: readonly number[], share: number): number | null {
  const sorted = [...values].sort((a, b) => a - b);
  const place = (sorted.length - 1) * share;
  const lower = sorted[Math.floor(place)];
  const upper = sorted[Math.ceil(place)];
  if (lower === undefined || upper === undefined) return null;
  return lower + (upper - lower) * (place - Math.floor(place));
}
