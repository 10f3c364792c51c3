import type { ExceedanceRow } from '#db/queries/exceedances';
import { toTenths } from '#lib/acoustics/rounding';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Acknowledgement, Exceedance } from '#lib/contracts/exceedances';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';

/** An exceedance as the interface gives it: levels in the tenths in which they are compared. */
export function exceedanceView(row: ExceedanceRow): Exceedance {
  const levelTenths = toTenths(row.levelDb);
  return {
    id: row.id,
    station: row.stationCode,
    stationName: row.stationName,
    limit: { id: row.limitId, version: row.limitVersion, name: row.limitName },
    unit: limitUnit(row.metric),
    descriptor: limitMetricText(row),
    from: formatInstantUtc(row.startsAtSec),
    to: formatInstantUtc(row.endsAtSec),
    loudest: loudestOf(row),
    level: levelTenths / 10,
    threshold: row.thresholdTenths / 10,
    excess: (levelTenths - row.thresholdTenths) / 10,
    coverage: row.coverage,
    state: row.state,
    revision: row.revision,
    detectedAt: row.detectedAt.toISOString(),
    revisedAt: row.revisedAt?.toISOString() ?? null,
    acknowledgement: acknowledgementOf(row),
    version: versionOf(row),
  };
}

function loudestOf({ loudestStartSec, loudestEndSec }: ExceedanceRow): Exceedance['loudest'] {
  if (loudestStartSec === null || loudestEndSec === null) return null;
  return { from: formatInstantUtc(loudestStartSec), to: formatInstantUtc(loudestEndSec) };
}

/** Names what somebody read of an exceedance: another one when it was revised or acknowledged since. */
export function versionOf({ revision, acknowledgedAt }: ExceedanceRow): string {
  return `${revision}-${acknowledgedAt?.getTime() ?? 0}`;
}

function acknowledgementOf(row: ExceedanceRow): Acknowledgement | null {
  const { acknowledgedAt, acknowledgedByName, cause, causeDetail, note, revisedAt } = row;
  if (acknowledgedAt === null) return null;
  return {
    at: acknowledgedAt.toISOString(),
    by: acknowledgedByName,
    cause,
    causeDetail,
    note: note ?? '',
    isOutdated: revisedAt !== null && revisedAt > acknowledgedAt,
  };
}
