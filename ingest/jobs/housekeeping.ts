import { removeUnclaimedFiles } from '#ingest/imports/files';
import { deleteJobRunsBefore } from '#db/queries/jobRuns';
import { deleteExpiredSessions } from '#db/queries/sessions';

const KEEP_JOB_RUNS_MS = 14 * 86_400_000;

/** Removes what has run out: sessions, the record of jobs older than two weeks, and uploads that broke off. */
export async function housekeeping(now: Date): Promise<string> {
  const sessions = await deleteExpiredSessions(now);
  const runs = await deleteJobRunsBefore(new Date(now.getTime() - KEEP_JOB_RUNS_MS));
  const files = await removeUnclaimedFiles(now);
  return `${sessions} sessions, ${runs} job runs, ${files} files`;
}
