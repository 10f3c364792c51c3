import { DateTime } from 'luxon';
import { listOutlived } from '#db/queries/complaintDesk';
import { findComplaint } from '#db/queries/complaints';
import { readDeskSettings } from '#db/queries/complaintSettings';
import { listNetworks } from '#db/queries/networks';
import { erasePersonalData } from '../closeComplaint';

/** Erased in one run of a network; the next run goes on. */
const MOST_A_RUN = 500;

/**
 * Erases the personal data of complaints that ended longer ago than their network keeps them: closed or answered, and nothing sent,
 * added or filed since. Each is audited. Safe to run twice. @returns how many were erased.
 */
export async function eraseOutlived(now: Date): Promise<number> {
  let erased = 0;
  for (const network of await listNetworks()) {
    const { retentionMonths: months } = await readDeskSettings(network.id);
    const before = DateTime.fromJSDate(now, { zone: 'utc' }).minus({ months }).toJSDate();
    for (const reference of await listOutlived(network.id, before, MOST_A_RUN)) {
      const complaint = await findComplaint(network.id, reference);
      if (!complaint) continue;
      await erasePersonalData({ by: 'retention', months }, complaint);
      erased += 1;
    }
  }
  return erased;
}
