import { removeUnclaimedFiles } from '#ingest/imports/files';
import { deleteAccountTokensExpired } from '#db/queries/accountTokens';
import { deleteItemsToldBefore } from '#db/queries/alertItems';
import { deleteTellingsBefore } from '#db/queries/alertTellings';
import { deleteUploadsBefore } from '#db/queries/importUploads';
import { deleteOffsetsBefore } from '#db/queries/clockOffsets';
import { deleteInvitationsBefore } from '#db/queries/invitations';
import { deleteJobRunsBefore } from '#db/queries/jobRuns';
import { deleteOriginsBefore } from '#db/queries/knownOrigins';
import { deleteJobTroublesBefore } from '#db/queries/jobTroubles';
import { deleteExpiredSessions } from '#db/queries/sessions';
import { deleteDeliveriesBefore } from '#db/queries/webhookDeliveries';
import { deleteDeadWorkers } from '#db/queries/workers';
import { eachAlone } from './alone';

const KEEP_JOB_RUNS_MS = 14 * 86_400_000;
/** An upload in parts can be taken up again for as long after its last part. */
const KEEP_UPLOADS_MS = 3 * 86_400_000;
/** Longer than anything is told again; what was told stands in the outbox. */
const KEEP_ALERTS_MS = 90 * 86_400_000;
/** Who is asked to join either does, or is asked anew. */
const KEEP_INVITATIONS_MS = 90 * 86_400_000;
/** As long as the cookie of a browser is kept there. */
const KEEP_ORIGINS_MS = 200 * 86_400_000;
/** A clock that was wrong is noticed within months. */
const KEEP_OFFSETS_SEC = 400 * 86_400;

/** A trouble that was not met again for so long is about something that is gone. */
const KEEP_TROUBLES_MS = 2 * 86_400_000;

/** What has run out, each with its removal. */
const REMOVALS: [what: string, remove: (now: Date) => Promise<unknown>][] = [
  ['sessions', deleteExpiredSessions],
  ['links to accounts', deleteAccountTokensExpired],
  ['invitations', (now) => deleteInvitationsBefore(before(now, KEEP_INVITATIONS_MS))],
  ['known browsers', (now) => deleteOriginsBefore(before(now, KEEP_ORIGINS_MS))],
  ['job runs', (now) => deleteJobRunsBefore(before(now, KEEP_JOB_RUNS_MS))],
  ['clock offsets', (now) => deleteOffsetsBefore(Math.floor(now.getTime() / 1000) - KEEP_OFFSETS_SEC)],
  ['alert items', (now) => deleteItemsToldBefore(before(now, KEEP_ALERTS_MS))],
  ['webhook deliveries', (now) => deleteDeliveriesBefore(before(now, KEEP_ALERTS_MS))],
  ['alert tellings', (now) => deleteTellingsBefore(before(now, KEEP_ALERTS_MS))],
  ['uploads', (now) => deleteUploadsBefore(before(now, KEEP_UPLOADS_MS))],
  ['files', removeUnclaimedFiles],
  ['dead workers', () => deleteDeadWorkers()],
  ['job troubles', (now) => deleteJobTroublesBefore(before(now, KEEP_TROUBLES_MS))],
];

/**
 * Removes what has run out: sessions, the record of jobs older than two weeks, and uploads that broke off, what clocks said
 * more than a year ago, notes of what alerts told, links and invitations, where people signed in from, and troubles of jobs that were about what is gone.
 */
export async function housekeeping(now: Date): Promise<string> {
  const removed: string[] = [];
  const subjectOf = ([what]: (typeof REMOVALS)[number]) => ({ name: what, networkId: null });
  const remove = async ([what, work]: (typeof REMOVALS)[number]) => {
    const count = await work(now);
    if (typeof count === 'number' && count > 0) removed.push(`${count} ${what}`);
    return 1;
  };
  await eachAlone('housekeeping', REMOVALS, subjectOf, remove, now);
  return removed.join(', ') || 'nothing';
}

function before(now: Date, ageMs: number): Date {
  return new Date(now.getTime() - ageMs);
}
