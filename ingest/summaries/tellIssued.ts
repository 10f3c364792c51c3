import { messageIdOf } from '#lib/services/mails/messageId';
import { type Connection } from '#db/queries/connection';
import { type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { type NetworkRow } from '#db/queries/networks';
import { insertMail } from '#db/queries/outbox';
import { listToldPeople } from '#db/queries/summaryReaders';
import { config } from '#lib/config/index';
import { escapeHtml } from '#lib/format/escapeHtml';
import { formatMonth } from '#lib/format/times';

/** Tells those who want to know that a month was issued or revised, in the transaction that issues it. */
export async function tellIssued(
  network: NetworkRow,
  { month, revision, issuedByName, changes, note }: Omit<IssuedSummaryRow, 'id'>,
  transaction: Connection,
): Promise<void> {
  const base = `${config().origin}/n/${network.slug}/summaries`;
  const what = revision === 1 ? 'is issued' : `is revised: revision ${revision}`;
  const subject = `${network.name}: the summary of ${formatMonth(month)} ${what}`;
  const lines = [
    `${issuedByName} has issued revision ${revision} of the noise summary of ${formatMonth(month)}, ${network.name}.`,
    ...(changes === null
      ? []
      : [
          `${changes.length} figures differ from revision ${revision - 1}, which stays available and is marked as superseded.`,
        ]),
    ...(note === '' ? [] : [note]),
    `Files, seal and what changed: ${base}/${month}`,
    `Whether you get such messages, you choose here: ${base}`,
  ];
  for (const { userId, email } of await listToldPeople(network.id, transaction)) {
    const dedupeKey = `summary:${network.id}:${month}:${revision}:${userId}`;
    await insertMail(
      {
        messageId: messageIdOf(dedupeKey),
        dedupeKey,
        networkId: network.id,
        kind: 'summary',
        recipient: email,
        subject,
        text: `${lines.join('\n\n')}\n`,
        html: `<!doctype html><html lang="en"><body style="font:15px/1.5 'Noto Sans',sans-serif;color:#22302a">${lines.map((line) => `<p>${escapeHtml(line)}</p>`).join('')}</body></html>`,
      },
      transaction,
    );
  }
}
