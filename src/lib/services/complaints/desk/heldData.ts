import { findOpenAnswer } from '#db/queries/complaintAnswers';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { listReplies, listSealedReplies } from '#db/queries/complaintReplies';
import type { ComplaintRow } from '#db/queries/complaints';
import type { Connection } from '#db/queries/connection';
import { findSealedAttachment } from '#db/queries/reports';
import { formatInstantUtc } from '#lib/contracts/common';
import type { HeldComplaint } from '#lib/contracts/personalExport';
import { listAdditions } from '../../reports/additions';
import { openAnswer } from '../answer/keptAnswer';
import { openFile } from '../personalData';
import { openPersonalData } from '../readPersonalData';
import { listFiled } from '../received/listFiled';
import { openLetter, openReply } from '../replyMessage';
import { openNotes } from './notes';

/** All that a complaint holds about a person; null once erased. The caller audits the look. @throws {PersonalDataUnreadable} */
export async function heldData(row: ComplaintRow, transaction: Connection): Promise<HeldComplaint | null> {
  const person = await openPersonalData(row.id, transaction);
  if (!person) return null;
  return {
    reference: row.reference,
    from: formatInstantUtc(row.startsAtSec),
    to: formatInstantUtc(row.endsAtSec),
    kind: row.kind,
    area: row.area,
    nearestStation: row.nearestStationCode,
    status: row.status,
    source: row.source,
    loggedAt: row.createdAt.toISOString(),
    person,
    file: await heldFile(row.id, transaction),
    additions: (await listAdditions(row.id, transaction)).map(({ atSec, text }) => ({
      at: formatInstantUtc(atSec),
      text,
    })),
    replies: await heldReplies(row.id, transaction),
    received: (await listFiled(row.id, transaction)).map(({ from, subject, text, receivedAt }) => ({
      at: receivedAt.toISOString(),
      from,
      subject,
      text,
    })),
    notes: (await openNotes(row.id, transaction)).map(({ at, author, text }) => ({
      at: at.toISOString(),
      author,
      text,
    })),
    answerInHand: await heldAnswer(row.id, transaction),
  };
}

async function heldFile(complaintId: number, transaction: Connection): Promise<HeldComplaint['file']> {
  const sealed = await findSealedAttachment(complaintId, transaction);
  if (!sealed) return null;
  const bytes = openFile(sealed.wrappedKey, complaintId, sealed.ciphertext);
  return { mediaType: sealed.mediaType, base64: bytes.toString('base64') };
}

async function heldReplies(complaintId: number, transaction: Connection): Promise<HeldComplaint['replies']> {
  const sent = new Map((await listReplies(complaintId, transaction)).map((reply) => [reply.id, reply]));
  const replies: HeldComplaint['replies'] = [];
  for (const sealed of await listSealedReplies(complaintId, transaction)) {
    const { to, subject, text } = openReply(sealed);
    const pdf = await openLetter(sealed.id, complaintId);
    const at = sent.get(sealed.id)?.createdAt.toISOString() ?? '';
    replies.push({ at, to, subject, text, pdfBase64: pdf?.toString('base64') ?? null });
  }
  return replies;
}

async function heldAnswer(complaintId: number, transaction: Connection): Promise<string | null> {
  const [answer, sealed] = [
    await findOpenAnswer(complaintId, transaction),
    await findSealedPerson(complaintId, transaction),
  ];
  return answer && sealed ? openAnswer(sealed.wrappedKey, answer).body : null;
}
