import {
  NOW_MINUTES,
  REPORT_WHENS,
  type ReportFault,
  type ReportField,
  type TypedReport,
} from '#lib/contracts/reports';
import { MOST_WINDOW_DAYS } from '#lib/contracts/complaints';
import { wallInstants } from '#lib/time/wallInstants';
import { addDays, isLocalDate, type LocalDate } from '#lib/time/zone';

/** "About three" is taken as this much before and after, seconds. */
const ABOUT_SEC = 1800;
const DAY_SEC = 86_400;
const OLDEST_DAYS = 366;
const NOON_MIN = 720;

const NIGHT = 'night-';
const CLOCK = /^([01]?\d|2[0-3])(?:[:.h]([0-5]\d))?$/;
const LOCAL = /^(\d{4}-\d{2}-\d{2})T(\d{2}):(\d{2})$/;

/** Half-open, epoch seconds. */
export interface ReportWindow {
  fromSec: number;
  toSec: number;
}

export type WindowOutcome =
  | { isClear: true; window: ReportWindow }
  | { isClear: false; faults: Partial<Record<ReportField, ReportFault>> };

/**
 * The window that a resident means, in the network's zone. Of the hour that comes twice in autumn a resident cannot say which
 * one it was: the window then takes in both. A time that the spring change skips is taken just after it.
 */
export function reportWindow(typed: TypedReport, zone: string, nowSec: number): WindowOutcome {
  switch (REPORT_WHENS.find((known) => known === typed.when)) {
    case 'now':
      return windowUntilNow(typed.lasting, nowSec);
    case 'about':
      return windowAbout(typed, zone, nowSec);
    case 'exact':
      return windowBetween(typed, zone, nowSec);
    default:
      return unclear('when', 'choose');
  }
}

function windowUntilNow(lasting: string, nowSec: number): WindowOutcome {
  const minutes = NOW_MINUTES.find((known) => String(known) === lasting);
  if (minutes === undefined) return unclear('lasting', 'choose');
  const toSec = Math.ceil(nowSec / 60) * 60;
  return { isClear: true, window: { fromSec: toSec - minutes * 60, toSec } };
}

function windowAbout({ day, clock }: TypedReport, zone: string, nowSec: number): WindowOutcome {
  const [, hour, minute = '0'] = CLOCK.exec(clock.trim()) ?? [];
  if (hour === undefined) return unclear('clock', 'unreadable-clock');
  const minutes = Number(hour) * 60 + Number(minute);
  const date = dateMeant(day, minutes);
  if (date === null) return unclear('day', 'choose');
  const instants = wallInstants(date, minutes, zone);
  const [first, last] = [Math.min(...instants), Math.max(...instants)];
  if (first > nowSec) return unclear('clock', 'future');
  const toSec = Math.min(last + ABOUT_SEC, Math.ceil(nowSec / 60) * 60);
  return bounded({ fromSec: first - ABOUT_SEC, toSec }, 'day', nowSec);
}

/** A night goes by the date of its evening: its hours before noon are the next day's. */
function dateMeant(day: string, minutes: number): LocalDate | null {
  const isNight = day.startsWith(NIGHT);
  const date = isNight ? day.slice(NIGHT.length) : day;
  if (!isLocalDate(date)) return null;
  return isNight && minutes < NOON_MIN ? addDays(date, 1) : date;
}

function windowBetween({ from, to }: TypedReport, zone: string, nowSec: number): WindowOutcome {
  const [starts, ends] = [localInstants(from, zone), localInstants(to, zone)];
  if (!starts || !ends) {
    return {
      isClear: false,
      faults: {
        ...(starts ? {} : { from: 'unreadable-time' }),
        ...(ends ? {} : { to: 'unreadable-time' }),
      },
    };
  }
  const [fromSec, endSec] = [Math.min(...starts), Math.max(...ends)];
  if (endSec <= fromSec) return unclear('to', 'ends-before');
  if (fromSec > nowSec) return unclear('from', 'future');
  return bounded({ fromSec, toSec: Math.min(endSec, Math.ceil(nowSec / 60) * 60) }, 'from', nowSec);
}

function bounded(window: ReportWindow, field: ReportField, nowSec: number): WindowOutcome {
  if (window.toSec - window.fromSec > MOST_WINDOW_DAYS * DAY_SEC) return unclear('to', 'too-long-window');
  if (window.fromSec < nowSec - OLDEST_DAYS * DAY_SEC) return unclear(field, 'too-long-ago');
  return { isClear: true, window };
}

function localInstants(text: string, zone: string): number[] | null {
  const [, date = '', hour, minute] = LOCAL.exec(text) ?? [];
  const minutes = Number(hour) * 60 + Number(minute);
  if (!isLocalDate(date) || Number(minute) > 59 || minutes >= 1440) return null;
  return wallInstants(date, minutes, zone);
}

function unclear(field: ReportField, fault: ReportFault): WindowOutcome {
  return { isClear: false, faults: { [field]: fault } };
}
