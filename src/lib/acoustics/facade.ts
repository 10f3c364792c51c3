/** Where a station's microphone stands. */
export type Placement = 'free-field' | 'facade';

/** What a façade's reflection adds, as a general rule, in dB (Directive 2002/49/EC Annex I 1). */
export const FACADE_CORRECTION_DB = 3;

/** A level of the incident sound, and what was taken off the measured one for it. */
export interface IncidentLevel {
  levelDb: number | null;
  correctionDb: number;
}

/**
 * Level of the incident sound, which Lden and limits on incident levels mean: at a façade, the measured level less the
 * correction. Applied once, when reporting, and shown; never stored.
 */
export function incidentLevel(
  measuredDb: number | null,
  placement: Placement,
  facadeCorrectionDb: number = FACADE_CORRECTION_DB,
): IncidentLevel {
  const correctionDb = placement === 'facade' ? -facadeCorrectionDb : 0;
  return { levelDb: measuredDb === null ? null : measuredDb + correctionDb, correctionDb };
}
