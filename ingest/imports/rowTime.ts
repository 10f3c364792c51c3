import { formatInstantUtc, parseInstant } from '#lib/contracts/common';
import { type RowReason } from '#lib/contracts/imports';
import { type Layout } from './layout';

/** The start of a row as RFC 3339, or why it cannot be told. `shown` is what the row has. */
export type RowTime = { start: string } | { reason: RowReason; detail: string; shown: string };

const WALL =
  /^(\d{1,4})[-/.](\d{1,2})[-/.](\d{1,4})[T ,]+(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,]0+)?)?(?:\s*([AaPp])[Mm])?$/;

/** Reads the start of a row. A local time that the clock showed twice, or never, is told, not guessed. */
export function readRowTime(cells: readonly string[], layout: Layout, durationSec: number): RowTime {
  const shown = textOf(cells, layout.places);
  if (shown === '') return { reason: 'malformed', detail: 'The time is missing.', shown };
  const sec = parseInstant(shown) ?? localSec(shown, layout);
  if (typeof sec !== 'number') return { ...sec, shown };
  const startSec = layout.mapping.marks === 'end' ? sec - durationSec : sec;
  return { start: Number.isInteger(startSec) && startSec >= 0 ? formatInstantUtc(startSec) : shown };
}

function textOf(cells: readonly string[], { start, date, time }: Layout['places']): string {
  const cell = (place: number | undefined) => (place === undefined ? '' : (cells[place] ?? '').trim());
  return start === undefined ? `${cell(date)} ${cell(time)}`.trim() : cell(start);
}

function localSec(shown: string, layout: Layout): number | { reason: RowReason; detail: string } {
  const wallMs = wallMsOf(shown, layout.mapping.dateOrder);
  if (wallMs === null) {
    return { reason: 'malformed', detail: `“${shown.slice(0, 40)}” is not a time as the columns say.` };
  }
  const instants = layout.instants.at(wallMs);
  const [instant] = instants;
  if (instant === undefined) {
    return {
      reason: 'nonexistent-time',
      detail: `${shown} never was in ${layout.mapping.zone}: the clock was put forward over it.`,
    };
  }
  if (instants.length > 1) {
    return {
      reason: 'ambiguous-time',
      detail: `${shown} came twice in ${layout.mapping.zone}, when the clock was put back; which is meant cannot be told.`,
    };
  }
  return instant / 1000;
}

/** What the wall showed, as the epoch ms that it would have in UTC; null for what is no time of the calendar. */
function wallMsOf(shown: string, order: Layout['mapping']['dateOrder']): number | null {
  const match = WALL.exec(shown);
  if (!match) return null;
  const [first = NaN, second = NaN, third = NaN] = match.slice(1, 4).map(Number);
  const [shortYear, month, day] =
    order === 'ymd'
      ? [first, second, third]
      : order === 'dmy'
        ? [third, second, first]
        : [third, first, second];
  const hour = hourOf(Number(match[4]), match[7]?.toLowerCase());
  const [minute, secondOfMinute] = [Number(match[5]), Number(match[6] ?? 0)];
  const year = shortYear < 100 ? 2000 + shortYear : shortYear;
  if (year < 1970 || hour === null || minute > 59 || secondOfMinute > 59) return null;
  if (hour === 24 && minute + secondOfMinute > 0) return null;
  const ms = Date.UTC(year, month - 1, day, hour, minute, secondOfMinute);
  const date = new Date(ms - (hour === 24 ? 86_400_000 : 0));
  const isOfCalendar = date.getUTCMonth() === month - 1 && date.getUTCDate() === day;
  return isOfCalendar ? ms : null;
}

/** Hour of the day from 0; 24 is the end of a day. */
function hourOf(hour: number, half: string | undefined): number | null {
  if (half === undefined) return hour <= 24 ? hour : null;
  if (hour < 1 || hour > 12) return null;
  return (hour % 12) + (half === 'p' ? 12 : 0);
}
