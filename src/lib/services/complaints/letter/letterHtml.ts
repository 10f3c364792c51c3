import { escapeHtml } from '#lib/format/escapeHtml';

/** A letter's plain text as HTML for e-mail: a paragraph for each blank line, nothing in it taken as markup. */
export function letterHtml(text: string): string {
  const paragraphs = text
    .split(/\n{2,}/)
    .map((paragraph) => `<p>${escapeHtml(paragraph.trim()).replaceAll('\n', '<br>')}</p>`);
  return (
    '<!doctype html><html lang="en"><body style="font-family:\'Noto Sans\',sans-serif;font-size:16px;line-height:1.5;' +
    `max-width:38em">${paragraphs.join('\n')}</body></html>`
  );
}
