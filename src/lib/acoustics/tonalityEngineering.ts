/** What a narrow-band analysis of one tone gives: ISO 1996-2:2007 Annex C, 2017 Annex J. */
export interface AnalysedTone {
  /** Level of the tone in dB. */
  toneDb: number;
  /** Level of the masking noise in the critical band around it, in dB. */
  noiseDb: number;
  /** Mid-frequency of that critical band in Hz. */
  centreHz: number;
}

/**
 * Tonal audibility ΔLta in dB above the masking threshold: Lpt − Lpn + 2 + lg[1 + (fc/502)^2.5] (ISO 1996-2:2007 C.3). Needs
 * a narrow-band analysis made elsewhere; thirds cannot give it.
 */
export function tonalAudibilityDb({ toneDb, noiseDb, centreHz }: AnalysedTone): number {
  return toneDb - noiseDb + 2 + Math.log10(1 + (centreHz / 502) ** 2.5);
}

/** Tonal adjustment Kt in dB from an audibility: 0 below 4 dB, ΔLta − 4 up to 10 dB, 6 above (ISO 1996-2:2007 C.4). */
export function tonalAdjustmentDb(audibilityDb: number): number {
  return Math.min(6, Math.max(0, audibilityDb - 4));
}

/** Upper bounds of mean audibility in dB with the adjustment up to each, ISO 1996-2:2017 Table J.1; beyond the last, 6 dB. */
const TABLE_J1 = [
  { upToDb: 0, adjustmentDb: 0 },
  { upToDb: 2, adjustmentDb: 1 },
  { upToDb: 4, adjustmentDb: 2 },
  { upToDb: 6, adjustmentDb: 3 },
  { upToDb: 9, adjustmentDb: 4 },
  { upToDb: 12, adjustmentDb: 5 },
] as const;

/** Tonal adjustment in whole dB from the mean audibility of a tone, ISO 1996-2:2017 Table J.1. */
export function meanAudibilityAdjustmentDb(meanAudibilityDb: number): number {
  return TABLE_J1.find(({ upToDb }) => meanAudibilityDb <= upToDb)?.adjustmentDb ?? 6;
}
