import { auditRightsTooWide } from '#db/queries/auditGrant';
import { log } from '#lib/config/log';

/** Warns in the log where this process's database account could change what the audit trail holds. Never throws. */
export async function warnOfAuditGrant(): Promise<void> {
  try {
    const rights = await auditRightsTooWide();
    if (rights.length === 0) return;
    log().warn(
      { rights },
      'the database account may change the audit trail; give web and worker one that may only add to it (ops/guide.md, Install)',
    );
  } catch (error) {
    log().warn({ err: error }, 'the rights of the database account could not be looked at');
  }
}
