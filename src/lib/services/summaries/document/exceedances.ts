import { type ExceedanceRow } from '#db/queries/exceedances';
import { formatInstantUtc } from '#lib/contracts/common';
import { type DocumentExceedance } from '#lib/contracts/monthEvidence';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';

/** An exceedance as a month lists it. Notes and names stay inside. */
export function documentExceedance(row: ExceedanceRow): DocumentExceedance {
  return {
    id: row.id,
    limitId: row.limitId,
    limitVersion: row.limitVersion,
    limit: row.limitName,
    metric: limitMetricText(row),
    from: formatInstantUtc(row.startsAtSec),
    to: formatInstantUtc(row.endsAtSec),
    level: row.levelDb,
    threshold: row.thresholdTenths / 10,
    unit: limitUnit(row.metric),
    coverage: row.coverage,
    state: row.state,
    cause: row.cause,
    causeDetail: row.causeDetail,
    isAcknowledged: row.acknowledgedAt !== null,
  };
}
