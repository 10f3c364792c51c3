import { type NetworkSettings } from '#db/queries/networks';
import { type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { periodsTouching } from '#lib/services/levels/datePeriods';
import { type Span } from '#lib/services/levels/spans';
import { type LocalDate } from '#lib/time/zone';

/** A period that long or longer shows pooled levels, a shorter one each of its days, evenings and nights. */
export const POOLED_FROM_SEC = 3 * 86_400 + 7200;

export interface NamedPeriod extends Span {
  date: LocalDate;
  kind: PeriodKind;
}

/**
 * The days, evenings and nights that a stretch of time is about, whole: those of which it holds at least half, or, where it is
 * too short for that, the one that holds its middle.
 */
export function periodsConcerned({ fromSec, toSec }: Span, timeline: NetworkSettings[]): NamedPeriod[] {
  const touched = periodsTouching(fromSec, toSec, timeline);
  const held = touched.filter((period) => {
    const insideSec = Math.min(toSec, period.toSec) - Math.max(fromSec, period.fromSec);
    return insideSec * 2 >= period.toSec - period.fromSec;
  });
  if (held.length > 0) return held;
  const middleSec = (fromSec + toSec) / 2;
  return touched.filter((period) => period.fromSec <= middleSec && middleSec < period.toSec);
}

/** The days, evenings and nights that begin within a stretch of time: what its pooled levels are of. */
export function periodsBeginningIn({ fromSec, toSec }: Span, timeline: NetworkSettings[]): NamedPeriod[] {
  return periodsTouching(fromSec, toSec, timeline).filter(
    (period) => period.fromSec >= fromSec && period.fromSec < toSec,
  );
}
