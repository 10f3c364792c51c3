import { appendAudit } from '#db/queries/audit';
import { findComplaint } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import {
  findAttachmentInfo,
  findReport,
  findSealedAttachment,
  type AttachmentInfo,
} from '#db/queries/reports';
import { openFile } from '../complaints/personalData';
import { ATTACHMENT_ENDINGS } from './attachment';

/** What the desk shows of a report beside the complaint. */
export interface ResidentReport {
  area: string | null;
  file: AttachmentInfo | null;
}

/** Null for a complaint that the liaison logged. */
export async function residentReport(complaintId: number): Promise<ResidentReport | null> {
  const report = await findReport(complaintId);
  if (!report) return null;
  return { area: report.area, file: (await findAttachmentInfo(complaintId)) ?? null };
}

/**
 * The file that came with a report, for a person who may read personal data (the caller has made sure). The look is in the
 * audit trail before the bytes are out. Null where there is none, or no more.
 */
export async function readAttachment(
  userId: string,
  networkId: number,
  reference: string,
): Promise<{ name: string; bytes: Buffer } | null> {
  const complaint = await findComplaint(networkId, reference);
  if (!complaint) return null;
  return inTransaction(async (transaction) => {
    const sealed = await findSealedAttachment(complaint.id, transaction);
    if (!sealed) return null;
    const bytes = openFile(sealed.wrappedKey, complaint.id, sealed.ciphertext);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'complaint.personal-data-read',
        subject: `complaint ${complaint.reference}`,
        detail: { fields: ['attachment'] },
      },
      transaction,
    );
    return { name: `${complaint.reference}.${ATTACHMENT_ENDINGS[sealed.mediaType]}`, bytes };
  });
}
