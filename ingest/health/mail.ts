import { insertMail } from '#db/queries/outbox';
import { messageIdOf } from '#ingest/notify/messageId';
import { escapeHtml } from '#lib/format/escapeHtml';
import type { Connection } from '#db/queries/connection';

/** A short message about one thing: what it is, its facts, where to go. */
export interface Note {
  subject: string;
  /** Said first, as a sentence or two. */
  opening: string;
  facts: readonly (readonly [name: string, value: string])[];
  link: { label: string; url: string };
  /** Why the person gets it. */
  closing: string;
}

export interface NoteCause {
  networkId: number;
  kind: string;
  /** Names the cause: one message a cause and recipient, for good. */
  key: string;
}

/** Puts a note into the outbox for each recipient, in the transaction of its cause. @returns how many were new. */
export async function putNotes(
  note: Note,
  { networkId, kind, key }: NoteCause,
  recipients: readonly string[],
  transaction: Connection,
): Promise<number> {
  let added = 0;
  for (const recipient of new Set(recipients)) {
    const messageId = messageIdOf(`${kind}:${networkId}:${key}:${recipient}`);
    const mail = { messageId, dedupeKey: `${kind}:${messageId}`, networkId, kind, recipient };
    const subject = note.subject.replace(/\s+/g, ' ').trim();
    const id = await insertMail({ ...mail, subject, text: textOf(note), html: htmlOf(note) }, transaction);
    if (id !== null) added += 1;
  }
  return added;
}

function textOf({ opening, facts, link, closing }: Note): string {
  const lines = facts.map(([name, value]) => `  ${`${name}:`.padEnd(13)}${value}`);
  return [opening, lines.join('\n'), `${link.label}: ${link.url}`, closing, '']
    .filter((part, at, all) => part !== '' || at === all.length - 1)
    .join('\n\n');
}

function htmlOf({ opening, facts, link, closing }: Note): string {
  const rows = facts
    .map(
      ([name, value]) =>
        `<tr><td style="padding:2px 16px 2px 0;color:#5a6660">${escapeHtml(name)}</td><td>${escapeHtml(value)}</td></tr>`,
    )
    .join('');
  return (
    `<!doctype html><html lang="en"><body style="font:15px/1.5 'Noto Sans',sans-serif;color:#22302a">` +
    `<p>${escapeHtml(opening)}</p><table>${rows}</table>` +
    `<p><a href="${escapeHtml(link.url)}">${escapeHtml(link.label)}</a></p>` +
    `<p style="color:#5a6660;font-size:13px">${escapeHtml(closing)}</p></body></html>`
  );
}
