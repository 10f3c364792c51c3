import { digestOlderContacts } from '#lib/services/complaints/desk/contactDigests';
import { eraseOutlived, listAllOutlived, type Outlived } from '#lib/services/complaints/desk/eraseOutlived';
import { eachAlone } from './alone';

const MOST_DIGESTS_A_RUN = 1000;

/** Erases personal data of complaints that are kept no longer, and gives complaints from before there were digests theirs. */
export async function keepComplaints(now: Date): Promise<string> {
  const subjectOf = ({ reference, networkId }: Outlived) => ({ name: `complaint ${reference}`, networkId });
  const erased = await eachAlone(
    'keep-complaints',
    await listAllOutlived(now),
    subjectOf,
    eraseOutlived,
    now,
  );
  const digested = await digestOlderContacts(MOST_DIGESTS_A_RUN);
  return `${erased} erased, ${digested} digested`;
}
