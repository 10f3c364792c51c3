import {
  addDays,
  datesBetween,
  instantAtSec,
  localDateAt,
  localMinuteAt,
  startOfDaySec,
} from '#lib/time/zone';
import { spanSec, type TimeView } from './timeView';
import { dayWords } from './timeWords';

/** A mark on the time axis. A `day` begins a civil date and carries it; a `time` carries the clock. */
export interface TimeTick {
  sec: number;
  kind: 'day' | 'time';
  label: string;
}

/** Steps between marks in minutes of the clock on the wall; whole days beyond. */
const STEPS_MIN = [1, 2, 5, 10, 15, 30, 60, 120, 180, 360, 720] as const;
const STEPS_DAYS = [1, 2, 7, 14, 28, 91] as const;

/** Least room of a mark among marks of the clock, in CSS pixels; a date among them has the room of its neighbours. */
const CLOCK_PX = 60;
/** Least room of a date among dates. */
const DATE_PX = 66;

/** Marks on the hours (or minutes, or dates) of the network's own clock, as many as have room on `widthPx`. */
export function timeTicks(view: TimeView, widthPx: number, zone: string): TimeTick[] {
  const roomSec = (labelPx: number) => (spanSec(view) * labelPx) / Math.max(labelPx, widthPx);
  const stepMin = STEPS_MIN.find((minutes) => minutes * 60 >= roomSec(CLOCK_PX));
  const ticks = stepMin ? clockTicks(view, stepMin, zone) : dateTicks(view, roomSec(DATE_PX), zone);
  return ticks.filter((tick) => tick.sec >= view.fromSec && tick.sec < view.toSec);
}

function clockTicks(view: TimeView, stepMin: number, zone: string): TimeTick[] {
  const secs = new Set<number>();
  const firstDate = localDateAt(view.fromSec, zone);
  for (const date of datesBetween(firstDate, addDays(localDateAt(view.toSec, zone), 1))) {
    const fromMin = date === firstDate ? localMinuteAt(view.fromSec, zone) : 0;
    for (let minute = fromMin - (fromMin % stepMin); minute < 1440; minute += stepMin) {
      const sec = instantAtSec(date, minute, zone);
      if (sec > view.toSec) break;
      secs.add(sec);
    }
  }
  const ordered = [...secs].sort((a, b) => a - b);
  return (stepMin <= 60 ? fillHoles(ordered, stepMin * 60) : ordered).map((sec) => clockTick(sec, zone));
}

/** The hour that the autumn change repeats leaves a hole between two marks of the clock. */
function fillHoles(secs: number[], stepSec: number): number[] {
  return secs.flatMap((sec, at) => {
    const nextSec = secs[at + 1] ?? sec + stepSec;
    return Array.from(
      { length: Math.max(1, Math.round((nextSec - sec) / stepSec)) },
      (_, n) => sec + n * stepSec,
    );
  });
}

function clockTick(sec: number, zone: string): TimeTick {
  const minute = localMinuteAt(sec, zone);
  if (minute === 0) return { sec, kind: 'day', label: dayWords(sec, zone) };
  const pad = (value: number) => String(value).padStart(2, '0');
  return { sec, kind: 'time', label: `${pad(Math.floor(minute / 60))}:${pad(minute % 60)}` };
}

function dateTicks(view: TimeView, roomSec: number, zone: string): TimeTick[] {
  const stepDays = STEPS_DAYS.find((days) => days * 86_400 >= roomSec) ?? 182;
  const dates = datesBetween(localDateAt(view.fromSec, zone), addDays(localDateAt(view.toSec, zone), 1));
  return dates
    .filter((date) => Math.round(Date.parse(`${date}T00:00:00Z`) / 86_400_000) % stepDays === 0)
    .map((date) => startOfDaySec(date, zone))
    .map((sec) => ({ sec, kind: 'day', label: dayWords(sec, zone) }));
}
