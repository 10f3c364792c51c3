import { pool, type Connection } from './connection';

/** What an operator decided about a doubtful stretch of a station. */
export interface DoubtDecisionRow {
  calibrationId: number;
  stationId: number;
  startSec: number;
  endSec: number;
  decision: 'keep' | 'exclude';
  exclusionId: number | null;
  /** Set: the exclusion was withdrawn since, so the stretch waits for a decision again. */
  exclusionWithdrawnAt: Date | null;
  reason: string;
  decidedAt: Date;
  decidedByName: string | null;
}

/** Decisions about doubtful stretches of a network's stations. */
export async function listDoubtDecisions(
  networkId: number,
  conn: Connection = pool(),
): Promise<DoubtDecisionRow[]> {
  return conn({ d: 'doubt_decisions' })
    .join('calibrations', 'calibrations.id', 'd.calibration_id')
    .leftJoin('exclusions', 'exclusions.id', 'd.exclusion_id')
    .leftJoin('users', 'users.id', 'd.decided_by')
    .where('calibrations.network_id', networkId)
    .select({
      calibrationId: 'd.calibration_id',
      stationId: 'd.station_id',
      startSec: 'd.starts_at',
      endSec: 'd.ends_at',
      decision: 'd.decision',
      exclusionId: 'd.exclusion_id',
      exclusionWithdrawnAt: 'exclusions.withdrawn_at',
      reason: 'd.reason',
      decidedAt: 'd.decided_at',
      decidedByName: 'users.name',
    });
}

export interface NewDoubtDecision {
  calibrationId: number;
  stationId: number;
  startSec: number;
  endSec: number;
  decision: 'keep' | 'exclude';
  exclusionId: number | null;
  reason: string;
  decidedBy: string;
}

/** Keeps a decision in the place of an earlier one about the same stretch. */
export async function setDoubtDecision(decision: NewDoubtDecision, conn: Connection): Promise<void> {
  await conn('doubt_decisions')
    .insert({
      calibration_id: decision.calibrationId,
      station_id: decision.stationId,
      starts_at: decision.startSec,
      ends_at: decision.endSec,
      decision: decision.decision,
      exclusion_id: decision.exclusionId,
      reason: decision.reason,
      decided_by: decision.decidedBy,
      decided_at: new Date(),
    })
    .onConflict(['calibration_id', 'station_id', 'starts_at'])
    .merge();
}
