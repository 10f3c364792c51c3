import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import { type Span } from '#lib/services/levels/spans';
import { addDays, localDateAt, localMinuteAt, startOfDaySec } from '#lib/time/zone';

/** More than this is told day by day. */
const HOURLY_UP_TO_SEC = 7 * 86_400 + 3600;
const HOUR_SEC = 3600;

/** The hours of the local clock, or the local dates, that a period's table has a row for, clipped to it and to now. */
export function stepsOf(
  { fromSec, toSec }: Span,
  timeline: NetworkSettings[],
  nowSec: number,
): { rowLength: 'hour' | 'day'; steps: Span[] } {
  const { timeZone } = pickSettings(timeline, fromSec);
  const endSec = Math.min(toSec, nowSec);
  const isHourly = toSec - fromSec <= HOURLY_UP_TO_SEC;
  const next = isHourly ? nextHour : nextDay;
  const steps: Span[] = [];
  for (let startSec = fromSec; startSec < endSec;) {
    const stepEndSec = Math.min(next(startSec, timeZone), endSec);
    steps.push({ fromSec: startSec, toSec: stepEndSec });
    startSec = stepEndSec;
  }
  return { rowLength: isHourly ? 'hour' : 'day', steps };
}

function nextHour(sec: number, timeZone: string): number {
  const wholeMinute = Math.floor(sec / 60) * 60;
  return wholeMinute - (localMinuteAt(sec, timeZone) % 60) * 60 + HOUR_SEC;
}

function nextDay(sec: number, timeZone: string): number {
  return startOfDaySec(addDays(localDateAt(sec, timeZone), 1), timeZone);
}
