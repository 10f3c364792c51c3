import { QUARTER_SEC, quarterAt } from './quarters';
import { parseUrlInstant } from './urlPeriod';

/** The past quarter-hour that an address names. */
export interface UrlMoment {
  /** Its beginning, epoch seconds; null: now. */
  sec: number | null;
  /** What was wrong with it, in words; now then stands in for it. */
  problem: string | null;
}

/** Reads `at=2026-03-17T12:00` (a local minute, a date, or RFC 3339): the quarter-hour that holds it, when that has passed. */
export function readUrlMoment(text: string | null, zone: string, nowSec: number): UrlMoment {
  if (!text) return { sec: null, problem: null };
  const sec = parseUrlInstant(text, zone);
  if (sec === null)
    return { sec: null, problem: 'The moment could not be read; the network is shown as it is now.' };
  const startSec = quarterAt(sec);
  if (startSec + QUARTER_SEC <= nowSec) return { sec: startSec, problem: null };
  return { sec: null, problem: 'That quarter-hour has not passed yet; the network is shown as it is now.' };
}
