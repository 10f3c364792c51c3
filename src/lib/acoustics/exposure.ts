/**
 * Sound exposure level LAE (SEL) in dB re 1 s: LAeq + 10 lg(T/1 s), T the valid seconds (ISO 1996-1). Null when nothing was
 * valid.
 */
export function laeDb(laeqDb: number | null, validSec: number): number | null {
  return laeqDb === null || validSec <= 0 ? null : laeqDb + 10 * Math.log10(validSec);
}

/** LAeq in dB over `durationSec` of events with these exposure levels and nothing else; null for none. */
export function laeqOfExposuresDb(laesDb: readonly number[], durationSec: number): number | null {
  if (!(durationSec > 0)) throw new RangeError(`${durationSec} s is not a duration.`);
  if (laesDb.length === 0) return null;
  const exposure = laesDb.reduce((sum, laeDb) => sum + 10 ** (laeDb / 10), 0);
  return 10 * Math.log10(exposure / durationSec);
}
