import { addDays, instantAtSec, type LocalDate } from './zone';
import type { PeriodKind, PeriodScheme } from '#lib/acoustics/dayEveningNight';

/** One day, evening or night: half-open, epoch seconds; `date` is the civil date on which it begins. */
export interface PeriodInstance {
  date: LocalDate;
  kind: PeriodKind;
  fromSec: number;
  toSec: number;
}

/**
 * The periods that begin on `date`, in order of time. They tile: the night ends where the next date's day begins, so on
 * a clock change it has an hour (or half) more or less. A scheme without evening has day and night.
 */
export function periodsOf(date: LocalDate, scheme: PeriodScheme, zone: string): PeriodInstance[] {
  const dayFrom = instantAtSec(date, scheme.dayStartMin, zone);
  const nightFrom = instantAtSec(date, scheme.nightStartMin, zone);
  const nextDay = instantAtSec(addDays(date, 1), scheme.dayStartMin, zone);
  const night: PeriodInstance = { date, kind: 'night', fromSec: nightFrom, toSec: nextDay };
  if (scheme.eveningStartMin === null)
    return [{ date, kind: 'day', fromSec: dayFrom, toSec: nightFrom }, night];
  const eveningFrom = instantAtSec(date, scheme.eveningStartMin, zone);
  return [
    { date, kind: 'day', fromSec: dayFrom, toSec: eveningFrom },
    { date, kind: 'evening', fromSec: eveningFrom, toSec: nightFrom },
    night,
  ];
}
