import { auditHead } from '#db/queries/auditLog';
import { inTransaction } from '#db/queries/connection';
import { insertMail } from '#db/queries/outbox';
import { config } from '#lib/config/index';
import { messageIdOf } from '#lib/services/mails/messageId';
import { noteHtml, noteText } from '#lib/services/mails/note';

/**
 * Mails the head of the audit trail to whom the settings name, once a day of UTC: whoever keeps these messages can tell later whether the trail was
 * made anew since, which the trail cannot tell of itself.
 */
export async function mailAuditHead(now: Date): Promise<string> {
  const recipient = config().auditHeadTo;
  if (recipient === null) return 'nobody is named';
  const date = now.toISOString().slice(0, 10);
  return inTransaction(async (transaction) => {
    const { position, sha256 } = await auditHead(transaction);
    const note = {
      subject: `Audit trail on ${date}: ${position} acts`,
      opening:
        'The head of the audit trail. Keep this message: with it a trail that was made anew can be told.',
      facts: [
        ['Head', `${position}:${sha256}`],
        ['At', now.toISOString()],
        ['Check by', `npx tsx ops/verifyAudit.ts --head ${position}:${sha256}`],
      ] as const,
      link: { label: 'Audit trail', url: `${config().origin}/admin/audit` },
      closing: 'You get this because BITTERN_AUDIT_HEAD_TO names you.',
    };
    const key = `audit-head:${date}:${recipient}`;
    const id = await insertMail(
      {
        messageId: messageIdOf(key),
        dedupeKey: key,
        networkId: null,
        kind: 'audit-head',
        recipient,
        subject: note.subject,
        text: noteText(note),
        html: noteHtml(note),
      },
      transaction,
    );
    return id === null ? 'was told before' : `act ${position}`;
  });
}
