import { energyOfDb, levelOfEnergyDb } from './energy';
import { toTenths } from './rounding';

/** An open window of a mean level so far. Seconds that were not measured count neither as loud nor as silent. */
export interface WindowSoFar {
  /** Sum over the valid seconds of 10^(L/10). */
  energySec: number;
  validSec: number;
  /** Seconds that may still be measured. */
  restSec: number;
}

/** Slack below the level that would just round to more than the limit, dB. */
const EDGE_SLACK_DB = 1e-6;

/**
 * How loud the rest of a window may be on average, in dB, for its mean to end at the limit, all of the rest being measured:
 * 10 lg{[10^(Lim/10)·(v + r) − E]/r} (energy arithmetic, ours). Where only rounding to tenths still saves the window, up to
 * the level that rounds to the limit. Null when nothing may be added: there is no rest, or the window passes even in silence.
 */
export function headroomDb(thresholdTenths: number, soFar: WindowSoFar): number | null {
  if (soFar.restSec <= 0) return null;
  const toLimit = budgetPerSec(thresholdTenths / 10, soFar);
  if (toLimit > 0) return levelOfEnergyDb(toLimit);
  const toEdge = budgetPerSec(edgeDb(thresholdTenths), soFar);
  return toEdge > 0 ? levelOfEnergyDb(toEdge) : null;
}

/**
 * Whether the window's mean is above the limit (whole tenths, half up, strictly greater) even when the rest is silent. It is
 * then certain to pass as soon as its coverage suffices.
 */
export function isCertainToPass(thresholdTenths: number, soFar: WindowSoFar): boolean {
  const quietestDb = heldAt(soFar, 0);
  return quietestDb !== null && toTenths(quietestDb) > thresholdTenths;
}

/** Mean level of the whole window in dB if its rest is at a level; null where nothing is measured and no rest is left. */
export function headingDb(soFar: WindowSoFar, restDb: number): number | null {
  return heldAt(soFar, energyOfDb(restDb));
}

/**
 * Seconds of a rest at a steady level until the window is certain to pass (0: it is already); null when it never is, the whole
 * rest being at that level.
 */
export function secondsUntilCertain(
  thresholdTenths: number,
  soFar: WindowSoFar,
  steadyDb: number,
): number | null {
  if (isCertainToPass(thresholdTenths, soFar)) return 0;
  const missing = budgetPerSec((thresholdTenths + 0.5) / 10, soFar) * soFar.restSec;
  const sec = missing / energyOfDb(steadyDb);
  return sec <= soFar.restSec ? Math.max(0, sec) : null;
}

/** Mean energy per second of rest that brings the mean of the window to a level; not positive when it is there already. */
function budgetPerSec(levelDb: number, { energySec, validSec, restSec }: WindowSoFar): number {
  return (energyOfDb(levelDb) * (validSec + restSec) - energySec) / restSec;
}

/** The highest level that still rounds to the limit. */
function edgeDb(thresholdTenths: number): number {
  return (thresholdTenths + 0.5) / 10 - EDGE_SLACK_DB;
}

function heldAt({ energySec, validSec, restSec }: WindowSoFar, restEnergy: number): number | null {
  const totalSec = validSec + restSec;
  return totalSec === 0 ? null : levelOfEnergyDb((energySec + restEnergy * restSec) / totalSec);
}
