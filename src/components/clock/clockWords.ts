import type { ClockShift, ClockShiftPreview } from '#lib/contracts/clockShifts';
import { formatDuration } from '#lib/format/durations';
import { formatInstant } from '#lib/format/times';

export const CLOCK_LABELS = {
  from: 'First time of the episode',
  to: 'Up to',
  shiftSeconds: 'Move by',
  receivedFrom: 'Only what came from',
  reason: 'Reason',
} as const;

export const SHIFT_STATES: Record<ClockShift['state'], string> = {
  moving: 'being moved',
  moved: 'stands',
  reversing: 'being put back',
  reversed: 'put back',
};

/** A shift in words: "1 h later", "40 s earlier". */
export function shiftWords(shiftSec: number): string {
  const far = Math.abs(shiftSec) < 60 ? `${Math.abs(shiftSec)} s` : formatDuration(Math.abs(shiftSec));
  return `${far} ${shiftSec > 0 ? 'later' : 'earlier'}`;
}

/** An offset of a clock in words: "1 h slow", "12 s ahead", "right to a second". */
export function offsetWords(aheadSec: number): string {
  const whole = Math.round(Math.abs(aheadSec));
  if (whole <= 1) return 'right to a second';
  return `${whole < 60 ? `${whole} s` : formatDuration(whole)} ${aheadSec > 0 ? 'ahead' : 'slow'}`;
}

const intervals = (count: number) => (count === 1 ? 'One interval' : `${count} intervals`);

/** What a shift would do, in a few sentences. */
export function shiftPreviewWords(preview: ClockShiftPreview, shiftSec: number, zone: string): string {
  const at = (instant: string) => formatInstant(Date.parse(instant) / 1000, zone);
  return (
    `${intervals(preview.intervals)}, the first of ${at(preview.first)}, the last of ${at(preview.last)}, ` +
    `would move ${shiftWords(shiftSec)}; ${preview.quarterHours} quarter-hours are computed anew, and limits are judged anew on them. ` +
    'Exclusions stay where they are: they say what was wrong at a time.'
  );
}
