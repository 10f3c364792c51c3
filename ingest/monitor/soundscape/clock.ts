import { instantAtSec, localDateAt, weekdayOf } from '#lib/time/zone';

/** The estuary's civil time. */
export const ESTUARY_ZONE = 'Europe/London';

/** What the clock on the wall shows. */
export interface LocalClock {
  /** Hours since local midnight, 0 ≤ h < 24, with fraction. */
  hour: number;
  /** 0 Monday … 6 Sunday. */
  weekday: number;
}

interface DaySpan {
  fromSec: number;
  toSec: number;
  weekday: number;
}

let lastDay: DaySpan | undefined;

/** Local clock at an instant, to the second; on the days of a clock change the hours run on from midnight. */
export function localClockAt(epochSec: number): LocalClock {
  if (!lastDay || epochSec < lastDay.fromSec || epochSec >= lastDay.toSec) lastDay = daySpan(epochSec);
  return { hour: ((epochSec - lastDay.fromSec) / 3600) % 24, weekday: lastDay.weekday };
}

function daySpan(epochSec: number): DaySpan {
  const date = localDateAt(epochSec, ESTUARY_ZONE);
  return {
    fromSec: instantAtSec(date, 0, ESTUARY_ZONE),
    toSec: instantAtSec(date, 1440, ESTUARY_ZONE),
    weekday: weekdayOf(date),
  };
}

/** 1 between `from` and `to` o'clock (across midnight when from > to), with soft shoulders of a quarter of an hour. */
export function between(hour: number, from: number, to: number): number {
  const length = (to - from + 24) % 24;
  const into = (hour - from + 24) % 24;
  const edge = Math.min(into, length - into);
  return edge <= 0 ? 0 : Math.min(1, edge / 0.25);
}
