import type { StoredInterval } from '#db/queries/intervals';
import { pickSettings } from '#db/queries/networks';
import { bandsOf, bandSlot } from '#lib/acoustics/bands';
import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { findEvents, type EventRules, type SoundEvent } from '#lib/acoustics/events';
import type { PeriodSums } from '#lib/acoustics/periodSums';
import { surveyTones, thirdsTenthsOfDb, TONAL_AVERAGING_SEC } from '#lib/acoustics/tonality';
import { EVENT_GAP_SEC } from '#lib/contracts/limitMetrics';
import { quarterAt } from '#lib/time/quarters';
import { accumulate, counts, type Judgement } from '../levels/accumulate';
import type { Span } from '../levels/spans';
import type { Measured, MetricRule } from './measure';

/**
 * Share of the valid time of a window, in per cent, in which the survey method (ISO 1996-2, Annex K) finds a tone: of minutes, or of
 * longer intervals, each by its own mean spectrum. Null for octaves, where it cannot be told.
 */
export function tonalShareOf(
  intervals: readonly StoredInterval[],
  window: Span,
  judgement: Judgement,
): Measured {
  const longestSec = intervals.reduce((longest, { durationSec }) => Math.max(longest, durationSec), 0);
  const blockSec = Math.max(TONAL_AVERAGING_SEC, longestSec);
  let [validSec, tonalSec, hasThirds] = [0, 0, false];
  for (let fromSec = window.fromSec; fromSec < window.toSec; fromSec += blockSec) {
    const block = { fromSec, toSec: Math.min(fromSec + blockSec, window.toSec) };
    const { sums } = accumulate(intervals, block, judgement, { bandClasses: false });
    validSec += sums.validSec;
    if (sums.bandFraction !== 3) continue;
    hasThirds = true;
    if (surveyTones(thirdsTenthsOfDb(thirdsDb(sums), bandsOf(3))).length > 0) tonalSec += sums.validSec;
  }
  return { levelDb: hasThirds ? (100 * tonalSec) / validSec : null, validSec };
}

function thirdsDb({ bandEnergySec, bandValidSec }: PeriodSums): (number | null)[] {
  return bandsOf(3).map(({ index }) => {
    const validSec = bandValidSec[bandSlot(index)] ?? 0;
    return validSec === 0 ? null : levelOfEnergyDb((bandEnergySec[bandSlot(index)] ?? 0) / validSec);
  });
}

/** What makes an event of a limit. */
export function eventRulesOf({
  eventTenths,
  eventMinimumSec,
  eventGapSec,
}: Pick<MetricRule, 'eventTenths' | 'eventMinimumSec' | 'eventGapSec'>): EventRules {
  return {
    thresholdTenths: eventTenths ?? NaN,
    minimumSec: eventMinimumSec ?? 0,
    bridgedGapSec: eventGapSec ?? EVENT_GAP_SEC,
  };
}

/** The events of a window: of one that reaches over its edge what lies within. */
export function eventsOf(
  intervals: readonly StoredInterval[],
  window: Span,
  judgement: Judgement,
  rules: EventRules,
): SoundEvent[] {
  const within = intervals.filter(({ startSec }) => window.fromSec <= startSec && startSec < window.toSec);
  const judged = within.map((interval) => ({
    ...interval,
    sampleSec: interval.durationSec,
    isValid: counts(
      interval,
      pickSettings(judgement.timeline, quarterAt(interval.startSec)).rules,
      judgement,
    ),
  }));
  return findEvents(judged, rules);
}

/** How many events a window has, or the greatest LAE of one. Null without any valid data, and of LAE without an event. */
export function eventMeasureOf(
  intervals: readonly StoredInterval[],
  window: Span,
  judgement: Judgement,
  rule: MetricRule,
): Measured {
  const { validSec } = accumulate(intervals, window, judgement, { bandClasses: false }).sums;
  const events = eventsOf(intervals, window, judgement, eventRulesOf(rule));
  if (rule.metric === 'eventCount') return { levelDb: validSec === 0 ? null : events.length, validSec };
  const exposures = events.map(({ figures }) => figures.laeDb()).filter((levelDb) => levelDb !== null);
  return { levelDb: exposures.length === 0 ? null : Math.max(...exposures), validSec };
}
