import type { ClockOffsets } from '#lib/contracts/clockShifts';
import { formatDayMonth, formatLocalDate } from '#lib/format/times';
import { localDateAt, type LocalDate } from '#lib/time/zone';
import { offsetWords } from './clockWords';

type Offset = ClockOffsets['items'][number];

const BRIDGED_SEC = 2 * 3600;

interface Point {
  share: number;
  value: number;
}

/** Offsets as pieces of a line: silence of more than two hours is a gap. */
export function offsetLines(
  items: readonly Offset[],
  { fromSec, toSec }: { fromSec: number; toSec: number },
) {
  const lines: Point[][] = [];
  let lastSec = -Infinity;
  for (const { at, aheadSeconds } of items) {
    const sec = Date.parse(at) / 1000;
    if (sec - lastSec > BRIDGED_SEC) lines.push([]);
    lines.at(-1)?.push({ share: (sec - fromSec) / (toSec - fromSec), value: aheadSeconds });
    lastSec = sec;
  }
  return lines;
}

/** Offsets of a local date: the least, the middle one and the greatest, in seconds, of how many quarter-hours. */
export interface OffsetDay {
  date: LocalDate;
  count: number;
  least: number;
  middle: number;
  greatest: number;
}

/** Offsets day by day, latest first. */
export function offsetDays(items: readonly Offset[], zone: string): OffsetDay[] {
  const days = new Map<LocalDate, number[]>();
  for (const { at, aheadSeconds } of items) {
    const date = localDateAt(Date.parse(at) / 1000, zone);
    days.set(date, [...(days.get(date) ?? []), aheadSeconds]);
  }
  return [...days]
    .map(([date, values]) => {
      const ascending = values.sort((a, b) => a - b);
      return {
        date,
        count: ascending.length,
        least: ascending[0] ?? 0,
        middle: ascending[Math.floor(ascending.length / 2)] ?? 0,
        greatest: ascending.at(-1) ?? 0,
      };
    })
    .reverse();
}

/** A sentence on offsets, with their period. */
export function offsetSummary(days: readonly OffsetDay[]): string {
  const [latest, first] = [days[0], days.at(-1)];
  if (!latest || !first) return 'The monitor has not sent its time in these days.';
  const worst = days.reduce((most, { least, greatest }) => {
    const further = Math.abs(least) > Math.abs(greatest) ? least : greatest;
    return Math.abs(further) > Math.abs(most) ? further : most;
  }, 0);
  return (
    `Clock of the monitor against ours, ${formatLocalDate(first.date)} to ${formatLocalDate(latest.date)}: ` +
    `on the last day ${offsetWords(latest.middle)}, at the furthest ${offsetWords(worst)}. The time that a post takes makes a clock look slower by as much.`
  );
}

/** Every third day or so, along the axis. */
export function dayTicks({ fromSec, toSec }: { fromSec: number; toSec: number }, zone: string) {
  const stepSec = Math.ceil((toSec - fromSec) / 86_400 / 8) * 86_400;
  return Array.from({ length: Math.floor((toSec - fromSec) / stepSec) + 1 }, (_, at) => {
    const sec = fromSec + at * stepSec;
    return {
      share: (sec - fromSec) / (toSec - fromSec),
      label: formatDayMonth(sec, zone),
    };
  });
}
