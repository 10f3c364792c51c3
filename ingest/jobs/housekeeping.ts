import { removeUnclaimedFiles } from '#ingest/imports/files';
import { deleteItemsToldBefore } from '#db/queries/alertItems';
import { deleteTellingsBefore } from '#db/queries/alertTellings';
import { deleteUploadsBefore } from '#db/queries/importUploads';
import { deleteOffsetsBefore } from '#db/queries/clockOffsets';
import { deleteJobRunsBefore } from '#db/queries/jobRuns';
import { deleteExpiredSessions } from '#db/queries/sessions';
import { deleteDeliveriesBefore } from '#db/queries/webhookDeliveries';

const KEEP_JOB_RUNS_MS = 14 * 86_400_000;
/** An upload in parts can be taken up again for as long after its last part. */
const KEEP_UPLOADS_MS = 3 * 86_400_000;
/** Longer than anything is told again; what was told stands in the outbox. */
const KEEP_ALERTS_MS = 90 * 86_400_000;
/** A clock that was wrong is noticed within months. */
const KEEP_OFFSETS_SEC = 400 * 86_400;

/**
 * Removes what has run out: sessions, the record of jobs older than two weeks, and uploads that broke off, what clocks said
 * more than a year ago, and notes of what alerts told.
 */
export async function housekeeping(now: Date): Promise<string> {
  const sessions = await deleteExpiredSessions(now);
  const runs = await deleteJobRunsBefore(new Date(now.getTime() - KEEP_JOB_RUNS_MS));
  await deleteOffsetsBefore(Math.floor(now.getTime() / 1000) - KEEP_OFFSETS_SEC);
  await deleteItemsToldBefore(new Date(now.getTime() - KEEP_ALERTS_MS));
  await deleteDeliveriesBefore(new Date(now.getTime() - KEEP_ALERTS_MS));
  await deleteTellingsBefore(new Date(now.getTime() - KEEP_ALERTS_MS));
  await deleteUploadsBefore(new Date(now.getTime() - KEEP_UPLOADS_MS));
  const files = await removeUnclaimedFiles(now);
  return `${sessions} sessions, ${runs} job runs, ${files} files`;
}
