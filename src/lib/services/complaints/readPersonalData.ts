import { appendAudit } from '#db/queries/audit';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { listSealedReplies } from '#db/queries/complaintReplies';
import type { ComplaintRow } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import { personalDataSchema, type PersonalData } from '#lib/contracts/complaints';
import { listAdditions, type Addition } from '../reports/additions';
import { listFiled, type FiledAnswer } from './received/listFiled';
import { openValue } from './personalData';
import { filledFields } from './personalFields';
import { openReply } from './replyMessage';

/** What a look at personal data shows: the person, and the letters sent to them by reply id. */
export interface PersonalFile {
  person: PersonalData;
  letters: ReadonlyMap<number, string>;
  /** What the resident wrote after the report. */
  additions: Addition[];
  /** What came back in answer to a reply. */
  received: FiledAnswer[];
}

/**
 * Personal data of a complaint for a person who may read them (liaison or administrator: the caller has made sure).
 * The look is in the audit trail before the data are out. Null once erased.
 */
export async function readPersonalData(
  userId: string,
  complaint: ComplaintRow,
): Promise<PersonalFile | null> {
  return inTransaction(async (transaction) => {
    const person = await openPersonalData(complaint.id, transaction);
    if (!person) return null;
    const sealed = await listSealedReplies(complaint.id, transaction);
    const letters = new Map(sealed.map((reply) => [reply.id, openReply(reply).text]));
    const additions = await listAdditions(complaint.id, transaction);
    const received = await listFiled(complaint.id, transaction);
    await appendAudit(
      {
        userId,
        networkId: complaint.networkId,
        action: 'complaint.personal-data-read',
        subject: `complaint ${complaint.reference}`,
        detail: {
          fields: [
            ...filledFields(person),
            ...(letters.size > 0 ? ['letters'] : []),
            ...(additions.length > 0 ? ['additions'] : []),
            ...(received.length > 0 ? ['received'] : []),
          ],
        },
      },
      transaction,
    );
    return { person, letters, additions, received };
  });
}

/** The person without an audit row, for acts that write one of their own. */
export async function openPersonalData(complaintId: number, conn: Connection): Promise<PersonalData | null> {
  const sealed = await findSealedPerson(complaintId, conn);
  if (!sealed) return null;
  return personalDataSchema.parse(openValue(sealed.wrappedKey, complaintId, 'person', sealed.ciphertext));
}
