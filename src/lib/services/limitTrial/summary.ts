import type { TrialCounts, TrialSummary } from '#lib/contracts/limitTrial';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';
import { windRuleText } from '#lib/format/windRule';
import type { Span } from '#lib/services/levels/spans';
import { addDays, localDateAt, startOfDaySec, weekdayOf } from '#lib/time/zone';
import type { CaughtWindow, StationTrial, TrialRule } from './tryRule';

const NONE: TrialCounts = { windows: 0, compared: 0, uncovered: 0, empty: 0, dismissed: 0, caught: 0 };

/** Counts of a trial: in all, by station, by week of the zone; and how many e-mails each recipient would have had. */
export function summaryOf(
  rule: TrialRule,
  tried: readonly StationTrial[],
  period: Span,
  zone: string,
): TrialSummary {
  const caught = caughtInOrder(tried);
  return {
    descriptor: limitMetricText(rule),
    windWords: rule.windRule ? windRuleText(rule.windRule) : null,
    threshold: rule.thresholdTenths / 10,
    unit: limitUnit(rule.metric),
    counts: tried.reduce((sum, { counts }) => added(sum, counts), NONE),
    stations: tried.map(({ station, counts }) => ({ code: station.code, name: station.name, ...counts })),
    weeks: weeksOf(caught, period, zone),
    mails: new Set(caught.map(({ endSec }) => endSec)).size,
  };
}

/** What was caught at all stations, in order of time. */
export function caughtInOrder(tried: readonly StationTrial[]): CaughtWindow[] {
  return tried
    .flatMap(({ caught }) => caught)
    .sort((a, b) => a.startSec - b.startSec || a.stationId - b.stationId);
}

function added(a: TrialCounts, b: TrialCounts): TrialCounts {
  return {
    windows: a.windows + b.windows,
    compared: a.compared + b.compared,
    uncovered: a.uncovered + b.uncovered,
    empty: a.empty + b.empty,
    dismissed: a.dismissed + b.dismissed,
    caught: a.caught + b.caught,
  };
}

/** Every week, from Monday, that a period touches, with how much was caught; `caught` in order of time. */
function weeksOf(
  caught: readonly CaughtWindow[],
  { fromSec, toSec }: Span,
  zone: string,
): TrialSummary['weeks'] {
  const weeks: TrialSummary['weeks'] = [];
  const firstDate = localDateAt(fromSec, zone);
  let at = 0;
  for (
    let monday = addDays(firstDate, -weekdayOf(firstDate));
    startOfDaySec(monday, zone) < toSec;
    monday = addDays(monday, 7)
  ) {
    const before = at;
    const endSec = startOfDaySec(addDays(monday, 7), zone);
    while ((caught[at]?.startSec ?? Infinity) < endSec) at += 1;
    weeks.push({ from: monday, caught: at - before });
  }
  return weeks;
}
