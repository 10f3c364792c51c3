import { pool, type Connection } from './connection';

/** What was found of an exceedance at one time. Revision 0 is the finding itself. */
export interface ExceedanceRevisionRow {
  revision: number;
  at: Date;
  state: 'standing' | 'lifted';
  /** Number within its limit of the version that it was judged by. */
  limitVersion: number;
  endsAtSec: number;
  levelDb: number;
  thresholdTenths: number;
  /** 0–1. */
  coverage: number;
}

/** Keeps an exceedance as it stands now as one of its revisions. Call it in the transaction that made the revision. */
export async function keepRevision(exceedanceId: number, transaction: Connection): Promise<void> {
  await transaction.raw(
    `INSERT INTO exceedance_revisions
       (exceedance_id, revision, at, state, limit_version_id, ends_at, level_db, threshold_tenths, coverage)
     SELECT id, revision, COALESCE(revised_at, detected_at), state, limit_version_id, ends_at, level_db,
       threshold_tenths, coverage
     FROM exceedances WHERE id = ?`,
    [exceedanceId],
  );
}

/** Revisions of an exceedance, the oldest first. */
export async function listRevisions(
  exceedanceId: number,
  conn: Connection = pool(),
): Promise<ExceedanceRevisionRow[]> {
  return conn('exceedance_revisions as r')
    .join('limit_versions as v', 'v.id', 'r.limit_version_id')
    .where('r.exceedance_id', exceedanceId)
    .orderBy('r.revision')
    .select({
      revision: 'r.revision',
      at: 'r.at',
      state: 'r.state',
      limitVersion: 'v.version',
      endsAtSec: 'r.ends_at',
      levelDb: 'r.level_db',
      thresholdTenths: 'r.threshold_tenths',
      coverage: 'r.coverage',
    });
}
