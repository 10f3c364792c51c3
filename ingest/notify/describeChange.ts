import type { LimitVersion } from '#db/queries/limits';
import type { ChangeKind } from '#ingest/detect/verdicts';
import type { TellingChange } from '#ingest/detect/judge';
import { roundHalfUp, toTenths } from '#lib/acoustics/rounding';
import { config } from '#lib/config/index';
import { formatInstantUtc } from '#lib/contracts/common';
import { formatCoverage } from '#lib/format/levels';
import { limitMetricText, limitUnit, limitValueText } from '#lib/format/limitMetric';
import { standingOutWords } from '#lib/format/standingOut';
import { formatPeriod, formatZone } from '#lib/format/times';
import { windRuleText } from '#lib/format/windRule';

/** What an e-mail says of one change, in words. */
export interface ChangeWords {
  station: string;
  /** "above the limit by 2.3 dB". */
  headline: string;
  /** Why an earlier message no longer holds: "later data changed the level"; null for what is new. */
  because: string | null;
  /** Pairs of a name and what it is. */
  facts: [name: string, value: string][];
  exceedanceUrl: string;
  stripUrl: string;
}

/** What is shown of the station around the window. */
const MARGIN_SEC = 3600;
const MOST_RANGES = 2;

/** Puts a change into words; times in the network's zone, which is named. */
export function describeChange(change: TellingChange, networkSlug: string): ChangeWords {
  const { verdict, station, settings, kind } = change;
  const { startSec, endSec, levelDb, version } = verdict;
  const base = `${config().origin}/n/${networkSlug}`;
  const [from, to] = [formatInstantUtc(startSec - MARGIN_SEC), formatInstantUtc(endSec + MARGIN_SEC)];
  const window = { fromSec: startSec, toSec: endSec };
  const unit = limitUnit(version.metric);
  return {
    station: `${station.code} ${station.name}`,
    headline: headlineOf(kind, levelDb, version),
    because: kind === 'found' ? null : becauseOf(change),
    facts: [
      [
        'Limit',
        `${version.name}: ${limitMetricText(version)} above ${limitValueText(version.thresholdTenths / 10, unit)}`,
      ],
      ...windFacts(version),
      ['Level', levelDb === null ? 'no level' : limitValueText(roundHalfUp(levelDb, 1), unit)],
      ...toldBefore(change),
      ['Period', `${formatPeriod(window, settings.timeZone)}, ${formatZone(settings.timeZone, window)}`],
      ...rollingFacts(change),
      ['Coverage', coverageWords(change)],
      ...change.standingOut
        .slice(0, MOST_RANGES)
        .map((range): [string, string] => ['Stands out', standingOutWords(range, station.bandFraction)]),
    ],
    exceedanceUrl: `${base}/exceedances/${change.exceedanceId}`,
    stripUrl: `${base}/stations/${station.code}?from=${from}&to=${to}`,
  };
}

function windFacts({ windRule }: LimitVersion): [string, string][] {
  return windRule ? [['Its wind rule', windRuleText(windRule)]] : [];
}

function headlineOf(
  kind: ChangeKind,
  levelDb: number | null,
  { thresholdTenths, metric }: Pick<LimitVersion, 'thresholdTenths' | 'metric'>,
): string {
  const excessDb = ((levelDb === null ? 0 : toTenths(levelDb)) - thresholdTenths) / 10;
  const by = `by ${limitValueText(excessDb, limitUnit(metric))}`;
  switch (kind) {
    case 'found':
      return `above the limit ${by}`;
    case 'changed':
      return `still above the limit, now ${by}`;
    case 'again':
      return `above the limit again, ${by}`;
    case 'lifted':
      return 'no longer above the limit';
  }
}

function becauseOf({ kind, isLimitChanged, verdict }: TellingChange): string {
  if (verdict.isWindowLost)
    return 'The limit, or the periods of the network, were changed: it has no such window now.';
  if (isLimitChanged) return 'The limit was changed.';
  if (kind === 'lifted') return 'Later data or an exclusion changed the level or its coverage.';
  return 'Later data or an exclusion changed the level.';
}

function toldBefore({ previousLevelDb, verdict }: TellingChange): [string, string][] {
  return previousLevelDb === null
    ? []
    : [['Told before', limitValueText(roundHalfUp(previousLevelDb, 1), limitUnit(verdict.version.metric))]];
}

/** Of rolling windows, which one the level is of, and that there may be more to come. */
function rollingFacts({ verdict: { loudest, isOngoing }, settings }: TellingChange): [string, string][] {
  if (loudest === null) return [];
  const window = { fromSec: loudest.startSec, toSec: loudest.endSec };
  return [
    ['Loudest', `the window ${formatPeriod(window, settings.timeZone)}`],
    ...(isOngoing
      ? [
          [
            'So far',
            'later windows may go on with it; told once more when it is over, if it was louder',
          ] satisfies [string, string],
        ]
      : []),
  ];
}

function coverageWords({ verdict: { coverage, minimumCoverage } }: TellingChange): string {
  const words = formatCoverage(coverage);
  if (minimumCoverage === null || coverage >= minimumCoverage - 1e-9) return words;
  return `${words}, less than the ${formatCoverage(minimumCoverage)} that it takes`;
}
