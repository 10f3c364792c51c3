import { escapeHtml } from '#lib/format/escapeHtml';

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

/** A note as plain text. */
export function noteText({ opening, facts, link, closing }: Note): string {
  const lines = facts.map(([name, value]) => `  ${`${name}:`.padEnd(13)}${value}`);
  return [opening, lines.join('\n'), `${link.label}: ${link.url}`, closing, '']
    .filter((part, at, all) => part !== '' || at === all.length - 1)
    .join('\n\n');
}

/** A note as HTML; what it tells is escaped. */
export function noteHtml({ opening, facts, link, closing }: Note): string {
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
