import type { LimitRecord } from '#db/queries/limits';
import { bandAt, type BandFraction } from '#lib/acoustics/bands';
import { EVENT_METRICS } from '#lib/acoustics/limitQuantities';
import type { WindRule } from '#lib/acoustics/windRule';
import { formatClockTime, formatInstantUtc } from '#lib/contracts/common';
import { EVENT_GAP_SEC } from '#lib/contracts/limitMetrics';
import { WEEKDAYS, type Limit, type LimitDetail, type LimitVersionView } from '#lib/contracts/limits';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';
import { windRuleText } from '#lib/format/windRule';
import { replacedFromSec, versionAt } from './force';

/** Who looks at limits. */
export interface LimitReader {
  /** Addresses are personal data: operators only. */
  seesRecipients: boolean;
  /** Codes of the network's stations by their ids. */
  codes: ReadonlyMap<number, string>;
  nowSec: number;
}

/** A limit as it is now, with its versions; `ofLimit` in their order, at least one. */
export function limitView(ofLimit: readonly LimitRecord[], reader: LimitReader): LimitDetail {
  const versions = ofLimit.map((version) => versionView(version, ofLimit, reader));
  return { limit: currentView(ofLimit, versions, reader), versions };
}

function currentView(
  ofLimit: readonly LimitRecord[],
  versions: readonly LimitVersionView[],
  { nowSec }: LimitReader,
): Limit {
  const inForce = versionAt(ofLimit, nowSec);
  const shown = inForce ?? firstToCome(ofLimit);
  const view = versions.find(({ version }) => version === shown.version);
  if (!view) throw new Error(`Limit ${shown.limitId} has no version ${shown.version}.`);
  const nextSec = inForce ? replacedFromSec(inForce, ofLimit) : Infinity;
  const { withdrawnAt, withdrawnByName, withdrawalReason } = shown;
  return {
    ...view,
    id: shown.limitId,
    state: withdrawnAt ? 'withdrawn' : inForce ? 'in-force' : 'upcoming',
    nextVersionFrom: withdrawnAt || nextSec === Infinity ? null : formatInstantUtc(nextSec),
    withdrawal: withdrawnAt && {
      at: withdrawnAt.toISOString(),
      by: withdrawnByName,
      reason: withdrawalReason ?? '',
    },
  };
}

/** Of versions that all lie in the future, the one that begins first and is not replaced before. */
function firstToCome(ofLimit: readonly LimitRecord[]): LimitRecord {
  const [first] = ofLimit
    .filter((version) => replacedFromSec(version, ofLimit) > version.effectiveFromSec)
    .sort((a, b) => a.effectiveFromSec - b.effectiveFromSec);
  if (!first) throw new Error('A limit has no version.');
  return first;
}

function nominalHz(fraction: BandFraction | null, index: number | null): number | null {
  return fraction === null || index === null ? null : bandAt(fraction, index).nominalHz;
}

function clockOf(minutes: number | null): string | null {
  return minutes === null ? null : formatClockTime(minutes);
}

function windView(rule: WindRule | null) {
  return {
    windMinimum: rule?.minimumMs ?? null,
    windMaximum: rule?.maximumMs ?? null,
    windFrom: rule?.fromDeg ?? null,
    windTo: rule?.toDeg ?? null,
    windDismissAbove: rule?.dismissAboveMs ?? null,
    windUnknown: rule?.unknown ?? ('left-out' as const),
    windWords: rule && windRuleText(rule),
  };
}

function versionView(
  version: LimitRecord,
  ofLimit: readonly LimitRecord[],
  { seesRecipients, codes }: LimitReader,
): LimitVersionView {
  const { bandFraction, bandIndex, fromMin, toMin, stationIds, withdrawnAt } = version;
  const endSec = Math.min(
    replacedFromSec(version, ofLimit),
    withdrawnAt ? Math.floor(withdrawnAt.getTime() / 1000) : Infinity,
  );
  return {
    version: version.version,
    name: version.name,
    metric: version.metric,
    window: version.averaging,
    windowMinutes: version.windowMin,
    stepMinutes: version.stepMin,
    bandHz: nominalHz(bandFraction, bandIndex),
    bandFraction,
    bandToHz: nominalHz(bandFraction, version.bandToIndex),
    percent: version.percent,
    eventThreshold: version.eventTenths === null ? null : version.eventTenths / 10,
    eventSeconds: version.eventMinimumSec,
    eventGap: EVENT_METRICS.includes(version.metric) ? (version.eventGapSec ?? EVENT_GAP_SEC) : null,
    backgroundFrom: clockOf(version.backgroundFromMin),
    backgroundTo: clockOf(version.backgroundToMin),
    descriptor: limitMetricText(version),
    threshold: version.thresholdTenths / 10,
    unit: limitUnit(version.metric),
    weekdays: WEEKDAYS.filter((_, bit) => (version.weekdays & (1 << bit)) !== 0),
    holidays: version.holidays,
    from: clockOf(fromMin),
    to: clockOf(toMin),
    minimumCoverage: version.minimumCoverage,
    ...windView(version.windRule),
    group: version.groupId,
    groupName: version.groupName,
    stations: stationIds && stationIds.map((id) => codes.get(id) ?? String(id)).sort(),
    ...(seesRecipients && { recipients: version.recipients }),
    reason: version.reason,
    effectiveFrom: formatInstantUtc(version.effectiveFromSec),
    effectiveTo: endSec === Infinity ? null : formatInstantUtc(endSec),
    createdAt: version.createdAt.toISOString(),
    createdBy: version.createdByName,
  };
}
