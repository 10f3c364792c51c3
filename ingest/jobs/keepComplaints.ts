import { listNetworks } from '#db/queries/networks';
import { digestOlderContacts } from '#lib/services/complaints/desk/contactDigests';
import { eraseOutlived, outlivedOf, type Outlived } from '#lib/services/complaints/desk/eraseOutlived';
import { eachAlone, networkSubject } from './alone';

const JOB = 'keep-complaints';
const MOST_DIGESTS_A_RUN = 1000;

/** Erases personal data of complaints that are kept no longer, and gives complaints from before there were digests theirs. */
export async function keepComplaints(now: Date): Promise<string> {
  const subjectOf = ({ reference, networkId }: Outlived) => ({ name: `complaint ${reference}`, networkId });
  const keep = async ({ id }: { id: number }) =>
    eachAlone(JOB, await outlivedOf(id, now), subjectOf, eraseOutlived, now);
  const erased = await eachAlone(JOB, await listNetworks(), networkSubject, keep, now);
  const digested = await digestOlderContacts(MOST_DIGESTS_A_RUN);
  return `${erased} erased, ${digested} digested`;
}
