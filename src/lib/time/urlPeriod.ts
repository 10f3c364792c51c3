import { offsetSec } from './offset';
import { addDays, instantAtSec, isLocalDate, startOfDaySec } from './zone';

const DAY_SEC = 86_400;
const MOST_PERIOD_SEC = 10 * 366 * DAY_SEC;
const LATEST_SEC = 4_294_967_295;
const LOCAL_MINUTE = /^(\d{4}-\d{2}-\d{2})T(\d{2}):(\d{2})$/;
const LOCAL_DATE = /^\d{4}-\d{2}-\d{2}$/;
const RFC_3339 = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}(?:\.\d+)?(?:Z|[+-]\d{2}:\d{2})$/i;

/** The period that an address names: half-open, epoch seconds. */
export interface UrlPeriod {
  fromSec: number;
  toSec: number;
  /** True where the address names none: the last 24 hours, which move on with the clock. */
  isDefault: boolean;
  /** What was wrong with the period in the address, in words; the last 24 hours then stand in for it. */
  problem: string | null;
}

/**
 * Reads `from` and `to`: local minutes (`2026-03-17T12:00`, `…T24:00` allowed), local dates (their beginning), or RFC 3339.
 * Without either, the last 24 hours up to the minute.
 */
export function readUrlPeriod(url: URL, zone: string, nowSec: number): UrlPeriod {
  const [from, to] = [url.searchParams.get('from'), url.searchParams.get('to')];
  if (!from && !to) return { ...lastDay(nowSec), isDefault: true, problem: null };
  const fromSec = from ? parseUrlInstant(from, zone) : null;
  const toSec = to ? parseUrlInstant(to, zone) : null;
  const problem = problemOf(fromSec, toSec);
  if (problem !== null || fromSec === null || toSec === null) {
    return { ...lastDay(nowSec), isDefault: true, problem };
  }
  return { fromSec, toSec, isDefault: false, problem: null };
}

/** Epoch seconds of one end of a period as an address or a form gives it, or null when it cannot be read. */
export function parseUrlInstant(text: string, zone: string): number | null {
  const sec = RFC_3339.test(text) ? secOfRfc3339(text) : parseLocal(text, zone);
  return sec !== null && sec >= 0 && sec <= LATEST_SEC ? Math.floor(sec) : null;
}

/**
 * One end of a period for an address: the local minute where that names the instant, else (in the hour that the autumn
 * change repeats, or between minutes) RFC 3339 in UTC.
 */
export function urlInstant(sec: number, zone: string): string {
  const local = new Date((sec + offsetSec(sec, zone)) * 1000)
    .toISOString()
    .slice(0, 'yyyy-MM-ddTHH:mm'.length);
  if (parseLocal(local, zone) === sec) return local;
  return `${new Date(sec * 1000).toISOString().slice(0, 'yyyy-MM-ddTHH:mm:ss'.length)}Z`;
}

/** Path and query of a page for a period, with the other parameters of `url` kept; without a period, the last 24 hours. */
export function hrefOfPeriod(
  url: URL,
  period: { fromSec: number; toSec: number } | null,
  zone: string,
): string {
  const query = new URLSearchParams(url.searchParams);
  for (const name of ['from', 'to', 'cursor']) query.delete(name);
  if (period) {
    query.set('from', urlInstant(period.fromSec, zone));
    query.set('to', urlInstant(period.toSec, zone));
  }
  // A colon needs no escape in a query, and an address that people read is better without.
  const text = query.toString().replaceAll('%3A', ':');
  return text ? `${url.pathname}?${text}` : url.pathname;
}

/** The last 24 hours, up to the minute. */
export function lastDay(nowSec: number): { fromSec: number; toSec: number } {
  const toSec = Math.floor(nowSec / 60) * 60;
  return { fromSec: toSec - DAY_SEC, toSec };
}

function problemOf(fromSec: number | null, toSec: number | null): string | null {
  if (fromSec === null || toSec === null) {
    return `The ${fromSec === null ? 'beginning' : 'end'} of the period could not be read.`;
  }
  if (fromSec >= toSec) return 'The period ends before it begins.';
  if (toSec - fromSec > MOST_PERIOD_SEC) return 'The period is longer than ten years.';
  return null;
}

function parseLocal(text: string, zone: string): number | null {
  if (LOCAL_DATE.test(text)) return isLocalDate(text) ? startOfDaySec(text, zone) : null;
  const match = LOCAL_MINUTE.exec(text);
  const [, date = '', hour, minute] = match ?? [];
  const minutes = Number(hour) * 60 + Number(minute);
  if (!match || !isLocalDate(date) || Number(minute) > 59 || minutes > 1440) return null;
  if (minutes === 1440) return startOfDaySec(addDays(date, 1), zone);
  return instantAtSec(date, minutes, zone);
}

function secOfRfc3339(text: string): number | null {
  const sec = isLocalDate(text.slice(0, 'yyyy-MM-dd'.length)) ? Date.parse(text.toUpperCase()) / 1000 : NaN;
  return Number.isNaN(sec) ? null : sec;
}
