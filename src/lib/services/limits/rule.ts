import type { NewLimitVersion } from '#db/queries/limits';
import { bandByNominalHz, type Band } from '#lib/acoustics/bands';
import { EVENT_METRICS } from '#lib/acoustics/limitQuantities';
import type { WindRule } from '#lib/acoustics/windRule';
import { EVENT_GAP_SEC } from '#lib/contracts/limitMetrics';
import { MOST_DAYS_BACK, WEEKDAYS, type NewLimit } from '#lib/contracts/limits';
import { whereOf, type LimitPlaces } from './where';

/** What is wrong with a limit, by field. */
export interface FieldProblem {
  field: keyof NewLimit;
  message: string;
}

/** A version of a limit without who made it. */
export type LimitRule = Required<Omit<NewLimitVersion, 'createdBy'>>;

export type ReadRule = { isValid: true; version: LimitRule } | { isValid: false; problems: FieldProblem[] };

/** A limit as it is stored, from what the interface was given, and what the network has. */
export function readRule(limit: NewLimit, places: LimitPlaces, nowSec: number): ReadRule {
  const problems: FieldProblem[] = [];
  const effectiveFromSec = limit.effectiveFrom ?? nowSec;
  if (effectiveFromSec < nowSec - MOST_DAYS_BACK * 86_400)
    problems.push({ field: 'effectiveFrom', message: `must be at most ${MOST_DAYS_BACK} days ago` });
  const [band, bandTo] = bandsOfLimit(limit);
  const where = whereOf(
    limit,
    [band, bandTo].filter((one) => one !== undefined),
    places,
  );
  if (Array.isArray(where)) return { isValid: false, problems: [...problems, ...where] };
  if (problems.length > 0) return { isValid: false, problems };
  return {
    isValid: true,
    version: {
      effectiveFromSec,
      name: limit.name,
      metric: limit.metric,
      averaging: limit.window,
      windowMin: limit.windowMinutes,
      stepMin: limit.stepMinutes,
      bandFraction: limit.bandFraction,
      bandIndex: band?.index ?? null,
      bandToIndex: bandTo?.index ?? null,
      percent: limit.percent,
      eventTenths: limit.eventThreshold === null ? null : Math.round(limit.eventThreshold * 10),
      eventMinimumSec: limit.eventSeconds,
      eventGapSec: EVENT_METRICS.includes(limit.metric) ? (limit.eventGap ?? EVENT_GAP_SEC) : null,
      backgroundFromMin: limit.backgroundFrom,
      backgroundToMin: limit.backgroundTo,
      thresholdTenths: Math.round(limit.threshold * 10),
      weekdays: limit.weekdays.reduce((bits, day) => bits | (1 << WEEKDAYS.indexOf(day)), 0),
      holidays: limit.holidays,
      fromMin: limit.from,
      toMin: limit.to,
      minimumCoverage: limit.minimumCoverage,
      windRule: windRuleOf(limit),
      ...where,
      recipients: distinctAddresses(limit.recipients),
      reason: limit.reason,
    },
  };
}

/** Null where no bound is given: what is unknown does not matter then. */
function windRuleOf(limit: NewLimit): WindRule | null {
  const { windMinimum, windMaximum, windFrom, windTo, windDismissAbove, windUnknown } = limit;
  const bounds = [windMinimum, windMaximum, windFrom, windTo, windDismissAbove];
  if (bounds.every((bound) => bound === null)) return null;
  return {
    minimumMs: windMinimum,
    maximumMs: windMaximum,
    fromDeg: windFrom,
    toDeg: windTo,
    dismissAboveMs: windDismissAbove,
    unknown: windUnknown,
  };
}

/** The band of a limit, and of several the last one. */
function bandsOfLimit({ bandFraction, bandHz, bandToHz }: NewLimit): (Band | undefined)[] {
  return [bandHz, bandToHz].map((hz) => (bandFraction && hz ? bandByNominalHz(bandFraction, hz) : undefined));
}

/** An address that differs only in capitals is the same one. */
function distinctAddresses(addresses: readonly string[]): string[] {
  return [...new Map(addresses.map((address) => [address.toLowerCase(), address])).values()];
}
