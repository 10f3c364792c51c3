import { missingRights } from '#db/queries/accountRights';
import type { Connection } from '#db/queries/connection';
import { endJobTrouble, noteJobTrouble } from '#db/queries/jobTroubles';
import { log } from '#lib/config/log';

const JOB = 'check-rights';
const SUBJECT = 'the database account';
const AGAIN_MS = 3_600_000;
const NAMED = 4;

/**
 * Looks whether the database account may do what web and worker do, which an upgrade may have added to. What it lacks is logged and
 * noted as a trouble of its own, with what to do, so that jobs that fail for it are explained.
 * @param conn whose account is looked at; ours by default.
 */
export async function checkRights(now: Date, conn?: Connection): Promise<string> {
  const missing = await missingRights(conn);
  if (missing.length === 0) {
    await endJobTrouble(JOB, SUBJECT);
    return 'all there';
  }
  log().error(
    { missing },
    'the database account lacks rights, so that jobs fail: repeat the grants (ops/guide.md, Upgrade, 4)',
  );
  const more = missing.length > NAMED ? ` and ${missing.length - NAMED} more` : '';
  const failure = `It lacks rights: repeat the grants (ops/guide.md, Upgrade, 4). ${missing.slice(0, NAMED).join('; ')}${more}`;
  await noteJobTrouble({
    job: JOB,
    subject: SUBJECT,
    networkId: null,
    failure: failure.slice(0, 300),
    lastAt: now,
    restsUntil: new Date(now.getTime() + AGAIN_MS),
  });
  return `missing on ${missing.length} tables`;
}
