import { type PlantDetails } from '#db/queries/plants';
import { QUARTER_SEC } from '#lib/time/quarters';
import { localDateAt, localMinuteAt, weekdayOf } from '#lib/time/zone';
import { type Span } from '../levels/spans';

export type Schedule = Pick<PlantDetails, 'weekdays' | 'fromMin' | 'toMin'>;

/** Local clock of an instant. */
export interface LocalClock {
  /** 0 is Monday. */
  weekday: number;
  minute: number;
}

/** Local clocks of a period, one a quarter-hour from its beginning. */
export function clocksOf({ fromSec, toSec }: Span, zone: string): LocalClock[] {
  const clocks: LocalClock[] = [];
  for (let sec = fromSec; sec < toSec; sec += QUARTER_SEC) {
    clocks.push({ weekday: weekdayOf(localDateAt(sec, zone)), minute: localMinuteAt(sec, zone) });
  }
  return clocks;
}

/** Part of a period, 0–1 by its quarter-hours, in which a plant was scheduled to run. */
export function scheduledShare(schedule: Schedule, clocks: readonly LocalClock[]): number {
  return clocks.length === 0
    ? 0
    : clocks.filter((clock) => isScheduled(schedule, clock)).length / clocks.length;
}

/** A run that ends on the next day belongs to the weekday on which it begins. */
function isScheduled({ weekdays, fromMin, toMin }: Schedule, { weekday, minute }: LocalClock): boolean {
  const runsOn = (day: number) => (weekdays & (1 << day)) !== 0;
  if (fromMin === null || toMin === null) return runsOn(weekday);
  if (fromMin < toMin) return runsOn(weekday) && fromMin <= minute && minute < toMin;
  return (runsOn(weekday) && minute >= fromMin) || (runsOn((weekday + 6) % 7) && minute < toMin);
}
