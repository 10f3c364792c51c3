/** Levels around a window for a small drawing: equal steps from `fromSec` on, null where nothing was measured. */
export interface WindowStrip {
  /** Epoch seconds. */
  fromSec: number;
  stepSec: number;
  /** The window itself, half-open, within the steps. */
  windowFromSec: number;
  windowToSec: number;
  laeqDb: (number | null)[];
  /** Whether a step has valid data; measured but excluded steps are drawn faintly. */
  isValid: boolean[];
  /** Nominal mid-band frequencies of `bandLevelsDb`, ascending. */
  bandsHz: number[];
  /** By step, then by band: unweighted levels. */
  bandLevelsDb: (number | null)[][];
}
