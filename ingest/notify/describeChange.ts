import type { ChangeKind } from '#ingest/detect/verdicts';
import type { TellingChange } from '#ingest/detect/judge';
import { config } from '#lib/config/index';
import { formatCoverage, formatDifferenceDb, formatLevelDb } from '#lib/format/levels';
import { limitMetricText } from '#lib/format/limitMetric';
import { formatPeriod, formatZone } from '#lib/format/times';
import { toTenths } from '#lib/acoustics/rounding';

/** What an e-mail says of one change, in words. */
export interface ChangeWords {
  station: string;
  /** "above the limit by 2.3 dB". */
  headline: string;
  /** Pairs of a name and what it is. */
  facts: [name: string, value: string][];
  exceedanceUrl: string;
  stripUrl: string;
}

const MARGIN_SEC = 3600;

/** Puts a change into words; times in the network's zone, which is named. */
export function describeChange(change: TellingChange, networkSlug: string): ChangeWords {
  const { verdict, station, settings } = change;
  const { version, startSec, endSec, levelDb, coverage } = verdict;
  const window = { fromSec: startSec, toSec: endSec };
  const limitDb = formatLevelDb(version.thresholdTenths / 10);
  const facts: [string, string][] = [
    ['Limit', `${version.name}: ${limitMetricText(version)} above ${limitDb} dB`],
    ['Level', levelDb === null ? 'no level' : `${formatLevelDb(levelDb)} dB`],
    ['Period', `${formatPeriod(window, settings.timeZone)}, ${formatZone(settings.timeZone, window)}`],
    ['Coverage', formatCoverage(coverage)],
  ];
  if (change.previousLevelDb !== null)
    facts.splice(2, 0, ['Told before', `${formatLevelDb(change.previousLevelDb)} dB`]);
  const base = `${config().origin}/n/${networkSlug}`;
  const iso = (sec: number) => new Date(sec * 1000).toISOString().replace('.000Z', 'Z');
  return {
    station: `${station.code} ${station.name}`,
    headline: headlineOf(change.kind, levelDb, version.thresholdTenths),
    facts,
    exceedanceUrl: `${base}/exceedances/${change.exceedanceId}`,
    stripUrl: `${base}/stations/${station.code}?from=${iso(startSec - MARGIN_SEC)}&to=${iso(endSec + MARGIN_SEC)}`,
  };
}

function headlineOf(kind: ChangeKind, levelDb: number | null, thresholdTenths: number): string {
  const excess =
    levelDb === null
      ? ''
      : ` by ${formatDifferenceDb((toTenths(levelDb) - thresholdTenths) / 10).replace('+', '')} dB`;
  switch (kind) {
    case 'found':
      return `above the limit${excess}`;
    case 'changed':
      return `still above the limit, now${excess}: later data changed the level`;
    case 'again':
      return `above the limit again${excess}: later data or a withdrawn exclusion changed the level`;
    case 'lifted':
      return 'no longer above the limit: later data or an exclusion changed the level or its coverage';
  }
}
