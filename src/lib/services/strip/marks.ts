import { listExceedancesOverlapping, type ExceedanceRecord } from '#db/queries/exceedanceRecords';
import { listLimitVersions, type LimitVersion } from '#db/queries/limits';
import { type Span } from '#lib/services/levels/spans';
import { type WindowRule } from '#lib/time/limitWindows';

/** A limit of the A-weighted level, in windows that are drawn, for the time that one version of it was in force. */
export interface LimitInForce extends WindowRule {
  id: number;
  name: string;
  metric: 'LAeq' | 'LAFmax';
  averaging: Exclude<WindowRule['averaging'], 'den'>;
  thresholdDb: number;
}

/** Limits of LAeq or LAFmax, the ones that are drawn, that hold, or held, for a station: every version with its time in force. */
export async function limitsOfStation(networkId: number, stationId: number): Promise<LimitInForce[]> {
  const versions = await listLimitVersions(networkId);
  return versions.flatMap((version, at) => {
    const { metric, averaging } = version;
    if (metric !== 'LAeq' && metric !== 'LAFmax') return [];
    if (averaging === 'den') return [];
    if (!concerns(version, stationId)) return [];
    const next = versions[at + 1];
    return [
      {
        id: version.id,
        name: version.name,
        metric,
        averaging,
        windowMin: version.windowMin,
        stepMin: version.stepMin,
        thresholdDb: version.thresholdTenths / 10,
        weekdays: version.weekdays,
        holidays: version.holidays,
        holidayDates: version.holidayDates,
        fromMin: version.fromMin,
        toMin: version.toMin,
        effectiveFromSec: version.effectiveFromSec,
        effectiveToSec: endOfForce(version, next?.limitId === version.limitId ? next : undefined),
      },
    ];
  });
}

function concerns({ stationIds }: LimitVersion, stationId: number): boolean {
  return stationIds === null || stationIds.includes(stationId);
}

function endOfForce(version: LimitVersion, next: LimitVersion | undefined): number | null {
  const withdrawnSec = version.withdrawnAt && Math.floor(version.withdrawnAt.getTime() / 1000);
  const ends = [next?.effectiveFromSec, withdrawnSec].filter((end) => typeof end === 'number');
  return ends.length === 0 ? null : Math.min(...ends);
}

/** Exceedances of a station whose window overlaps a stretch of time, in order of time; lifted ones too. */
export function exceedancesOfStation(
  stationId: number,
  { fromSec, toSec }: Span,
): Promise<ExceedanceRecord[]> {
  return listExceedancesOverlapping(stationId, fromSec, toSec);
}
