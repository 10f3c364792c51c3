import { DateTime } from 'luxon';
import { listOutlived } from '#db/queries/complaintDesk';
import { findComplaint } from '#db/queries/complaints';
import { readDeskSettings } from '#db/queries/complaintSettings';
import { erasePersonalData } from '../closeComplaint';

/** Named in one run of a network; the next run goes on. */
const MOST_A_RUN = 500;

/** A complaint whose personal data are kept no longer. */
export interface Outlived {
  networkId: number;
  reference: string;
  /** As long as the network keeps them. */
  months: number;
}

/**
 * Complaints of a network that ended longer ago than it keeps them: closed or answered, and nothing sent, added or filed since.
 */
export async function outlivedOf(networkId: number, now: Date): Promise<Outlived[]> {
  const { retentionMonths: months } = await readDeskSettings(networkId);
  const before = DateTime.fromJSDate(now, { zone: 'utc' }).minus({ months }).toJSDate();
  const references = await listOutlived(networkId, before, MOST_A_RUN);
  return references.map((reference) => ({ networkId, reference, months }));
}

/** Erases one's personal data, audited. Safe to run twice. @returns 1, or 0 when the complaint is gone. */
export async function eraseOutlived({ networkId, reference, months }: Outlived): Promise<number> {
  const complaint = await findComplaint(networkId, reference);
  if (!complaint) return 0;
  await erasePersonalData({ by: 'retention', months }, complaint);
  return 1;
}
