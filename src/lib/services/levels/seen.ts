import { type MeasuredInterval } from '#db/queries/intervalRows';
import { INVALIDITY_REASONS, invalidityReasons, type ValidityRules } from '#lib/acoustics/validity';
import { isExcluded, withWeather, type Judgement } from './accumulate';

/** An interval that arrives later than this after its end counts as late: it was kept back, not just sent in a batch. */
export const LATE_AFTER_SEC = 3600;

/** Whether an interval arrived late. */
export function isLate({ startSec, durationSec, receivedAtSec }: MeasuredInterval): boolean {
  return receivedAtSec - (startSec + durationSec) > LATE_AFTER_SEC;
}

/** Why an interval does not count, as bits: bit n is `INVALIDITY_REASONS[n]`. */
export function reasonBitsOf(interval: MeasuredInterval, rules: ValidityRules, judgement: Judgement): number {
  return invalidityReasons(withWeather(interval, judgement), rules, isExcluded(interval, judgement)).reduce(
    (bits, reason) => bits | (1 << INVALIDITY_REASONS.indexOf(reason)),
    0,
  );
}
