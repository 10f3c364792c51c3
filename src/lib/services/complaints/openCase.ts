import { listReplies } from '#db/queries/complaintReplies';
import { findComplaint, type ComplaintRow } from '#db/queries/complaints';
import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import type { Evidence } from '#lib/contracts/complaintEvidence';
import type { Complaint, PersonalData, Reply } from '#lib/contracts/complaints';
import { localDateAt } from '#lib/time/zone';
import type { Addition } from '../reports/additions';
import { gatherEvidence } from './evidence';
import type { Whereabouts } from './letter/measured';
import { readPersonalData } from './readPersonalData';
import type { FiledAnswer } from './received/listFiled';
import { complaintView, replyView } from './view';

export interface CaseReader {
  userId: string;
  mayReadPersonalData: boolean;
  network: NetworkRow;
  settings: NetworkSettings;
}

/** A complaint with all that its reader may see. */
export interface ComplaintCase {
  row: ComplaintRow;
  complaint: Complaint;
  evidence: Evidence;
  replies: Reply[];
  /** Undefined for a reader who may not see them; null once erased. */
  person: PersonalData | null | undefined;
  /** What the resident wrote after the report; empty for a reader who may not see it. */
  additions: Addition[];
  /** What came back in answer to a reply; empty for a reader who may not see it. */
  received: FiledAnswer[];
  /** Stations seen from the resident, by code; empty where the exact place is unknown or not the reader's to see. */
  whereabouts: Record<string, Whereabouts>;
}

/**
 * Opens a complaint: the figures of its window and what was replied. A reader who may see personal data gets them (that look
 * is audited) and the stations around the exact place; any other reader gets the nearest station alone, because distances to
 * several stations would tell the place. Undefined where the network has no such complaint.
 */
export async function openCase(
  { userId, mayReadPersonalData, network, settings }: CaseReader,
  reference: string,
  now: Date,
): Promise<ComplaintCase | undefined> {
  const row = await findComplaint(network.id, reference);
  if (!row) return undefined;
  const file = mayReadPersonalData ? await readPersonalData(userId, row) : undefined;
  const person = file === undefined ? undefined : (file?.person ?? null);
  const nowSec = Math.floor(now.getTime() / 1000);
  const [{ evidence, whereabouts }, replies] = await Promise.all([
    gatherEvidence({ network, complaint: row, place: person?.place ?? null, nowSec }),
    listReplies(row.id),
  ]);
  return {
    row,
    complaint: complaintView(row, localDateAt(nowSec, settings.timeZone)),
    evidence,
    replies: replies.map((reply) => ({
      ...replyView(reply),
      ...(file === undefined ? {} : { text: file?.letters.get(reply.id) ?? null }),
    })),
    person,
    additions: file?.additions ?? [],
    received: file?.received ?? [],
    whereabouts,
  };
}

/** A complaint as everybody with a role in the network may read it, without its evidence. */
export async function findView(
  network: NetworkRow,
  settings: NetworkSettings,
  reference: string,
  now: Date,
): Promise<Complaint | undefined> {
  const row = await findComplaint(network.id, reference);
  return row && complaintView(row, localDateAt(Math.floor(now.getTime() / 1000), settings.timeZone));
}
