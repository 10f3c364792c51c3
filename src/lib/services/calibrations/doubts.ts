import { listCalibrations, type CalibrationRow } from '#db/queries/calibrations';
import { pool, type Connection } from '#db/queries/connection';
import { listDeployments, type DeploymentRow } from '#db/queries/deployments';
import { listDoubtDecisions, type DoubtDecisionRow } from '#db/queries/doubtDecisions';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { type Doubt } from '#lib/contracts/calibrations';
import { formatInstantUtc } from '#lib/contracts/common';
import { groupBy } from '../groupBy';
import { driftCentiDb, goodness } from './calibrationJson';
import { doubtfulStretches, sharedSpan } from './doubt';

/** A doubtful stretch of one station. Half-open, epoch seconds; a null end is open. */
export interface StationDoubt {
  check: CalibrationRow;
  stationId: number;
  stationCode: string;
  fromSec: number;
  toSec: number | null;
  /** Null: an operator has yet to decide. */
  decision: DoubtDecisionRow | null;
}

/**
 * Doubtful stretches of a network's stations, latest first. They are derived from checks, stays and decisions each time, so a
 * check that is noted late or withdrawn changes them at once.
 */
export async function doubtsOf(networkId: number, conn: Connection = pool()): Promise<StationDoubt[]> {
  const calibrations = await listCalibrations(networkId, null, conn);
  const standing = calibrations.filter(({ withdrawnAt }) => withdrawnAt === null);
  if (standing.every((check) => goodness(check).isGoodBefore && goodness(check).isGoodAfter)) return [];
  const stays = (await listDeployments(networkId, conn)).filter(({ withdrawnAt }) => withdrawnAt === null);
  const decisions = await listDoubtDecisions(networkId, conn);
  return [...groupBy(standing.toReversed(), ({ instrumentId }) => instrumentId)]
    .flatMap(([instrumentId, checks]) =>
      ofInstrument(
        checks,
        stays.filter((stay) => stay.instrumentId === instrumentId),
      ),
    )
    .map((doubt) => ({ ...doubt, decision: decisionOn(doubt, decisions) }))
    .sort((a, b) => b.fromSec - a.fromSec);
}

function ofInstrument(
  checks: readonly CalibrationRow[],
  stays: readonly DeploymentRow[],
): Omit<StationDoubt, 'decision'>[] {
  const byId = new Map(checks.map((check) => [check.id, check]));
  const states = checks.map((check) => ({ id: check.id, atSec: check.checkedAtSec, ...goodness(check) }));
  return doubtfulStretches(states).flatMap((stretch) =>
    stays.flatMap((stay) => {
      const check = byId.get(stretch.calibrationId);
      const shared = sharedSpan(stretch, { fromSec: stay.startSec, toSec: stay.endSec });
      if (!check || !shared) return [];
      return [{ check, stationId: stay.stationId, stationCode: stay.stationCode, ...shared }];
    }),
  );
}

/** A decision holds for the very stretch that it was made about, while the exclusion that it led to stands. */
function decisionOn(
  { check, stationId, fromSec, toSec }: Omit<StationDoubt, 'decision'>,
  decisions: readonly DoubtDecisionRow[],
): DoubtDecisionRow | null {
  const decision = decisions.find(
    (one) =>
      one.calibrationId === check.id &&
      one.stationId === stationId &&
      one.startSec === fromSec &&
      one.endSec === toSec,
  );
  return decision && !decision.exclusionWithdrawnAt ? decision : null;
}

/** A doubtful stretch as the interface gives it. */
export function doubtJson({ check, stationCode, fromSec, toSec, decision }: StationDoubt): Doubt {
  return {
    calibration: check.id,
    instrument: check.instrumentId,
    serialNumber: check.serialNumber,
    station: stationCode,
    from: formatInstantUtc(fromSec),
    to: toSec === null ? null : formatInstantUtc(toSec),
    drift: centiDbToDb(driftCentiDb(check)),
    driftBound: centiDbToDb(check.driftBoundCentiDb),
    state: decision ? (decision.decision === 'keep' ? 'kept' : 'excluded') : 'undecided',
    decision: decision && {
      by: decision.decidedByName,
      at: decision.decidedAt.toISOString(),
      reason: decision.reason,
    },
  };
}
