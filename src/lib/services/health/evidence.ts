import { type FullThresholds } from '#lib/contracts/health';

/** An interval as far as its plausibility goes. Levels in hundredths of a dB. */
export interface IntervalEvidence {
  startSec: number;
  durationSec: number;
  /** Everything that was measured, as one text: the same text is the same levels, band by band. */
  fingerprint: string;
  /** LAeq reported less LAeq from bands, in dB; null where the bands do not cover what matters. */
  isInconsistent: boolean | null;
  batteryV: number | null;
  /** Calibrator, self-check: steady by intent, and no noise of the place. */
  isCheck: boolean;
  /** As bits. */
  flags: number;
  receivedAtSec: number;
}

/** Quiet of a stretch of 24 hours: its lowest tenth, in dB; null where too little was measured. */
export type FloorDb = number | null;

/** Everything about a station that its health is judged by. Times in epoch seconds. */
export interface StationEvidence {
  nowSec: number;
  intervalSec: number;
  thresholds: FullThresholds;
  /** Flags that are ordinary at the station, as bits. */
  expectedFlags: number;
  /** The newest interval's end, and when anything new came last; null before the first. */
  newestEndSec: number | null;
  lastPostSec: number | null;
  /** Newest intervals, ascending: an hour of them, or as long as the rules ask. */
  intervals: readonly IntervalEvidence[];
  /** The smaller of the last two differences of the monitor's clock from ours; null where it does not send its time. */
  clockAheadSec: number | null;
  /** Records of the last hour that were refused because they end in the future. */
  refusedAheadCount: number;
  /** Share of the last 24 hours (less the newest quarter-hours, which may be on their way) that was received. */
  received24h: number | null;
  floorDb: { lastDay: FloorDb; usual: FloorDb };
  /** Of the stretch that the rule asks for. */
  wind: { count: number; firstSec: number | null; leastMs: number | null; mostMs: number | null };
}

/** What a rule finds. */
export type Finding =
  | { state: 'fine' }
  /** Nothing can be said now: what was found before stays. */
  | { state: 'unknown' }
  | {
      state: 'bad';
      sinceSec: number;
      /** In the unit of the kind. */
      measured: number | null;
      bound: number | null;
    };

export const FINE: Finding = { state: 'fine' };
export const UNKNOWN: Finding = { state: 'unknown' };

/** A rule. `openSinceSec` is when the trouble began that is not over yet, or null. */
export type Rule = (evidence: StationEvidence, openSinceSec: number | null) => Finding;

/** A bound in seconds that never asks for more than a station of this interval can do. */
export function waitSec(minutes: number, intervalSec: number): number {
  return Math.max(minutes * 60, 3 * intervalSec);
}
