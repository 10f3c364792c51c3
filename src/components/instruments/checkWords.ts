import type { Calibration, DueCheck } from '#lib/contracts/calibrations';
import { formatDifferenceDb } from '#lib/format/levels';
import { formatLocalDate } from '#lib/format/times';

/** Field → what its label says. */
export const CHECK_LABELS = {
  checkedAt: 'Checked at',
  calibratorLevel: 'Calibrator level',
  before: 'Shown before',
  after: 'Shown after',
  calibrator: 'Calibrator',
  checkedBy: 'Checked by',
  certificate: 'Certificate',
  note: 'Note',
} as const;

/** "−0.6 dB, more than the 0.5 dB that the network allows". */
export function driftWords({ drift, driftBound, isWithinBound }: Calibration): string {
  const words = `${formatDifferenceDb(drift)} dB`;
  return isWithinBound
    ? words
    : `${words}, more than the ${driftBound.toFixed(1)} dB that the network allowed`;
}

/** "Check due Fri 1 January 2027", with what that means today. */
export function dueWords({ dueOn, state, lastCheckedAt }: DueCheck): string {
  const date = formatLocalDate(dueOn);
  if (state === 'overdue') {
    return lastCheckedAt ? `Check overdue since ${date}` : 'Never checked since it was added';
  }
  return `Next check due ${date}`;
}
