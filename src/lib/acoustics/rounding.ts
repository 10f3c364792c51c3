/**
 * Slack, in units of the last digit kept, that lets a value a few binary roundings below a half count as the half:
 * 0.15 · 10 or 57.25 reached through logarithms. Far above the error of doubles, far below anything measured.
 */
const HALF_SLACK = 1e-9;

/** `scaled` to the nearest integer, halves up (−0.5 → 0). */
function nearestHalfUp(scaled: number): number {
  return Math.floor(scaled + 0.5 + HALF_SLACK);
}

/**
 * Rounds half up (towards +∞) to `decimals` decimal places; the convention of every printed figure. Applied once, at the
 * end, never to a value that is calculated with afterwards. Source: reference/levels.json "rounding" (0.5 is rounded up).
 */
export function roundHalfUp(value: number, decimals: number): number {
  const scale = 10 ** decimals;
  return nearestHalfUp(value * scale) / scale;
}

/** A level in dB as integer tenths, half up. Limits and tonal thresholds are compared in these. */
export function toTenths(levelDb: number): number {
  return nearestHalfUp(levelDb * 10);
}

/** A level in integer hundredths of a dB as integer tenths, half up also below zero (−5 → 0, −6 → −1). */
export function centiDbToTenths(centiDb: number): number {
  return Math.floor((centiDb + 5) / 10);
}

/** A level in dB as integer hundredths, half up: the form in which levels are stored. */
export function toCentiDb(levelDb: number): number {
  return nearestHalfUp(levelDb * 100);
}

/** Integer hundredths of a dB as dB. */
export function centiDbToDb(centiDb: number): number {
  return centiDb / 100;
}
