import { digestOlderContacts } from '#lib/services/complaints/desk/contactDigests';
import { eraseOutlived } from '#lib/services/complaints/desk/eraseOutlived';

const MOST_DIGESTS_A_RUN = 1000;

/** Erases personal data of complaints that are kept no longer, and gives complaints from before there were digests theirs. */
export async function keepComplaints(now: Date): Promise<string> {
  const erased = await eraseOutlived(now);
  const digested = await digestOlderContacts(MOST_DIGESTS_A_RUN);
  return `${erased} erased, ${digested} digested`;
}
