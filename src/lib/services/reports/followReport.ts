import { findComplaint, type ComplaintRow } from '#db/queries/complaints';
import { listReplies, listSealedReplies } from '#db/queries/complaintReplies';
import { pool } from '#db/queries/connection';
import {
  findAttachmentInfo,
  findReportByKey,
  type AttachmentInfo,
  type ReportRow,
} from '#db/queries/reports';
import { openPersonalData } from '../complaints/readPersonalData';
import { openReply } from '../complaints/replyMessage';
import { listAdditions, type Addition } from './additions';
import type { PublicNetwork } from './openForm';
import { keyDigestOf } from './reportSecrets';

const KEY = /^[A-Za-z0-9_-]{43}$/;

/** A report and its complaint, by the key of its private page. */
export interface FoundReport {
  report: ReportRow;
  complaint: ComplaintRow;
}

/** What the private page shows. The contact is not told back: the address of the page may have been passed on. */
export interface FollowedReport extends FoundReport {
  isErased: boolean;
  words: string;
  canBeWrittenTo: boolean;
  file: AttachmentInfo | null;
  additions: Addition[];
  /** Replies of the liaison, oldest first. */
  letters: Addition[];
}

/** Undefined where the key opens no report of this network. */
export async function findByKey({ network }: PublicNetwork, key: string): Promise<FoundReport | undefined> {
  if (!KEY.test(key)) return undefined;
  const report = await findReportByKey(network.id, keyDigestOf(key));
  const complaint = report && (await findComplaint(network.id, report.reference));
  return report && complaint && { report, complaint };
}

/** Opens a report for the resident who holds its key. */
export async function followReport(network: PublicNetwork, key: string): Promise<FollowedReport | undefined> {
  const found = await findByKey(network, key);
  if (!found) return undefined;
  const { id } = found.complaint;
  const person = await openPersonalData(id, pool());
  const [file, additions, letters] = await Promise.all([
    findAttachmentInfo(id),
    listAdditions(id, pool()),
    openLetters(id),
  ]);
  return {
    ...found,
    isErased: person === null,
    words: person?.words ?? '',
    canBeWrittenTo: person !== null && person.contact.email !== null,
    file: file ?? null,
    additions,
    letters,
  };
}

async function openLetters(complaintId: number): Promise<Addition[]> {
  const [replies, sealed] = await Promise.all([listReplies(complaintId), listSealedReplies(complaintId)]);
  return sealed.map((reply) => {
    const at = replies.find(({ id }) => id === reply.id)?.createdAt ?? new Date(0);
    return { atSec: Math.floor(at.getTime() / 1000), text: openReply(reply).text };
  });
}
