import type { Drift, DriftVerdictJson } from '#lib/contracts/drift';
import { RECENT_DAYS, trimmedMean } from '#lib/acoustics/drift';
import { formatDifferenceDb } from '#lib/format/levels';
import { formatLocalDate, formatMonth } from '#lib/format/times';

type Day = Drift['days'][number];
type Quantity = 'difference' | 'selfCheck';

interface Point {
  share: number;
  value: number;
}

/** What a drawing of half a year shows of one quantity: each day, and the mean of ten days as pieces of a line. */
export function driftPoints(days: readonly Day[], quantity: Quantity): { dots: Point[]; lines: Point[][] } {
  const share = (at: number) => (days.length < 2 ? 0 : at / (days.length - 1));
  const values = days.map((day) => day[quantity]);
  const dots = values.flatMap((value, at) => (value === null ? [] : [{ share: share(at), value }]));
  const lines: Point[][] = [[]];
  values.forEach((_, at) => {
    const recent = values.slice(Math.max(0, at - RECENT_DAYS + 1), at + 1).filter((value) => value !== null);
    const value = recent.length < RECENT_DAYS / 2 ? null : trimmedMean(recent);
    if (value === null) lines.push([]);
    else lines.at(-1)?.push({ share: share(at), value });
  });
  return { dots, lines: lines.filter((line) => line.length > 1) };
}

/** First days of the months, along the axis. */
export function monthTicks(days: readonly Day[]): { share: number; label: string }[] {
  return days.flatMap(({ date }, at) =>
    date.endsWith('-01')
      ? [{ share: at / Math.max(1, days.length - 1), label: formatMonth(date.slice(0, 7)).slice(0, 3) }]
      : [],
  );
}

/** What was done, along the axis, each with the letter that the list beside the drawing has. */
export function markLetters({
  days,
  marks,
}: Drift): (Drift['marks'][number] & { share: number; letter: string })[] {
  return marks.flatMap((mark, at) => {
    const day = days.findIndex(({ date }) => date === mark.date);
    if (day === -1) return [];
    return [
      { ...mark, share: day / Math.max(1, days.length - 1), letter: String.fromCharCode(65 + (at % 26)) },
    ];
  });
}

/** What is within the bound of a verdict's baseline; null without one. */
export function boundBand({ baseline, bound }: DriftVerdictJson): { low: number; high: number } | null {
  return baseline === null ? null : { low: baseline - bound, high: baseline + bound };
}

/** A sentence on a verdict, with its period and how many nights it rests on. */
export function verdictWords(drift: Drift, quantity: Quantity): string {
  const verdict = quantity === 'difference' ? drift.background : drift.selfCheck;
  const used = drift.days.filter((day) => day[quantity] !== null).length;
  const last = drift.days.at(-1)?.date ?? drift.from;
  const rests = `Of ${drift.days.length} nights from ${formatLocalDate(drift.from)} to ${formatLocalDate(last)}, ${used} have a value.`;
  const what =
    quantity === 'difference'
      ? 'The nightly background against the neighbours’'
      : 'What the self-checks show';
  const { state, change, bound, by } = verdict;
  if (state === 'unknown' || change === null) {
    return `${what} cannot be judged: it takes 21 nights of eight weeks and five of the last ten. ${rests}`;
  }
  const moved = `has moved by ${formatDifferenceDb(change)} dB ${by === 'slope' ? 'along a steady slope' : 'against its eight weeks before'}`;
  return state === 'drifting'
    ? `${what} ${moved}, beyond the bound of ${bound.toFixed(1)} dB. ${rests}`
    : `${what} ${moved}, within the bound of ${bound.toFixed(1)} dB. ${rests}`;
}
