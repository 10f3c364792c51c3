import type { Connection } from '#db/queries/connection';
import { insertAttachment, insertReport } from '#db/queries/reports';
import type { ReportFault, ReportFaults, ReportLanguage, TypedReport } from '#lib/contracts/reports';
import { logComplaint } from '../complaints/logComplaint';
import { sealFile } from '../complaints/personalData';
import { isDuplicateKey } from '../duplicateKey';
import type { PublicNetwork } from './openForm';
import { readReport, type ReadableReport } from './readReport';
import { checkStamp, keyDigestOf, privateKeyOf } from './reportSecrets';
import { countSent, maySend, type Sender } from './sendingBounds';

/** A form as it came in. */
export interface PostedReport {
  typed: TypedReport;
  fileBytes: Uint8Array | null;
  /** The field that nobody sees; a program fills it in. */
  hidden: string;
  stamp: string;
  language: ReportLanguage;
  /** The sender's address, for the bounds only; it is not kept. */
  address: string;
}

export type TakeOutcome = { kind: 'taken'; key: string } | { kind: 'refused'; faults: ReportFaults };

/**
 * Takes a resident's report: it becomes a complaint like any other, with contact, words, place, effects and file sealed under
 * its key. The answer holds the key of the private page, which is kept nowhere here.
 */
export async function takeReport(
  { network, settings, form }: PublicNetwork,
  posted: PostedReport,
  now: Date,
): Promise<TakeOutcome> {
  const nowSec = Math.floor(now.getTime() / 1000);
  if (!form.isOpen) return refused('closed');
  if (posted.hidden !== '') return refused('hidden-field');
  const read = readReport(posted.typed, posted.fileBytes, {
    areas: form.areas,
    timeZone: settings.timeZone,
    nowSec,
  });
  if (!read.isReadable) return { kind: 'refused', faults: read.faults };
  const stamp = checkStamp(posted.stamp, network.id, nowSec);
  if (stamp.kind !== 'good') return refused(stamp.kind === 'too-fast' ? 'too-fast' : 'form-expired');

  const sender: Sender = { networkId: network.id, address: posted.address };
  const key = privateKeyOf(stamp.nonce, [posted.typed, read.report.file?.bytes.toString('base64') ?? null]);
  const may = await maySend(sender, now);
  if (may !== 'yes') return refused(may);
  try {
    const outcome = await logComplaint({ userId: null, network, settings }, read.report.complaint, now, {
      effects: read.report.effects,
      writeBeside: async (complaintId, wrappedKey, transaction) => {
        const keyDigest = keyDigestOf(key);
        await insertReport({ complaintId, keyDigest, language: posted.language }, transaction);
        await keepFile(complaintId, wrappedKey, read.report.file, transaction);
        await countSent(sender, now, transaction);
      },
    });
    if (outcome.kind === 'logged') return { kind: 'taken', key };
    return outcome.field !== 'to' ? { kind: 'refused', faults: { area: 'station-away' } } : refused('future');
  } catch (error) {
    // The very same form came twice: the first one stands.
    if (isDuplicateKey(error)) return { kind: 'taken', key };
    throw error;
  }
}

async function keepFile(
  complaintId: number,
  wrappedKey: Buffer,
  file: ReadableReport['file'],
  transaction: Connection,
): Promise<void> {
  if (!file) return;
  const ciphertext = sealFile(wrappedKey, complaintId, file.bytes);
  await insertAttachment(
    { complaintId, mediaType: file.type, byteCount: file.bytes.length, ciphertext },
    transaction,
  );
}

function refused(fault: ReportFault): TakeOutcome {
  return { kind: 'refused', faults: { '': fault } };
}
