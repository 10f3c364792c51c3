import { escapeHtml } from '#lib/format/escapeHtml';
import { addressText, attachmentsOf, type StoredMail } from './store';

const STYLE = `
:root { color-scheme: light dark; --paper: oklch(0.98 0.01 95); --ink: oklch(0.27 0.03 155); --soft: oklch(0.46 0.02 155);
  --line: oklch(0.88 0.015 95); --link: oklch(0.45 0.09 235); }
@media (prefers-color-scheme: dark) { :root { --paper: oklch(0.2 0.015 155); --ink: oklch(0.93 0.012 95);
  --soft: oklch(0.74 0.015 120); --line: oklch(0.33 0.015 155); --link: oklch(0.78 0.08 235); } }
* { box-sizing: border-box; }
body { margin: 0 auto; max-width: 60rem; padding: 1.25rem; background: var(--paper); color: var(--ink);
  font: 15px/1.5 'Noto Sans', system-ui, sans-serif; }
h1 { font-size: 1.4rem; margin: 0.5rem 0 0.25rem; overflow-wrap: anywhere; }
a { color: var(--link); } p.soft, dt { color: var(--soft); }
a:focus-visible, summary:focus-visible, input:focus-visible, button:focus-visible { outline: 2px solid var(--link); outline-offset: 2px; }
form { margin: 1rem 0; display: flex; gap: 0.5rem; flex-wrap: wrap; align-items: end; }
label { display: block; color: var(--soft); font-size: 14px; }
input, button { font: inherit; padding: 0.3rem 0.6rem; border: 1px solid var(--soft); border-radius: 3px;
  background: var(--paper); color: var(--ink); max-width: 100%; }
ol { list-style: none; margin: 0; padding: 0; } li { border-top: 1px solid var(--line); padding: 0.6rem 0; }
li span { color: var(--soft); font-size: 14px; display: block; } time { font-variant-numeric: tabular-nums; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: 0.15rem 1rem; margin: 0.5rem 0 1rem; }
dd { margin: 0; overflow-wrap: anywhere; }
summary { cursor: pointer; color: var(--soft); }
iframe { width: 100%; height: 32rem; border: 1px solid var(--line); background: white; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; border-top: 1px solid var(--line); padding-top: 1rem; font: inherit; }
`;

function page(title: string, body: string): string {
  return (
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width">` +
    `<title>${escapeHtml(title)}</title><style>${STYLE}</style></head><body>${body}</body></html>`
  );
}

function timeOf({ parsed, id }: StoredMail): string {
  const at = parsed.date ?? new Date(Number(id.slice(0, 14)));
  return `${at.toISOString().slice(0, 16).replace('T', ' ')} UTC`;
}

/** Every message, newest first. */
export function listPage(mails: readonly StoredMail[], to: string): string {
  const rows = mails.map(
    (mail) =>
      `<li><a href="/messages/${mail.id}">${escapeHtml(mail.parsed.subject || 'No subject')}</a>` +
      `<span>${escapeHtml(mail.recipients.join(', '))} · <time>${timeOf(mail)}</time></span></li>`,
  );
  const none = to === '' ? 'No message has arrived yet.' : `No message to “${escapeHtml(to)}” has arrived.`;
  return page(
    'Mailbox',
    `<h1>Mailbox</h1><p class="soft">Mail that Bittern sends on this machine arrives here and goes nowhere else.</p>` +
      `<form><div><label for="to">Recipient</label><input id="to" name="to" type="search" value="${escapeHtml(to)}"></div>` +
      `<button>Show</button></form>${rows.length > 0 ? `<ol>${rows.join('')}</ol>` : `<p>${none}</p>`}`,
  );
}

/** One message; its HTML stands in a frame of its own that can run nothing and fetch nothing. */
export function messagePage(mail: StoredMail): string {
  const { parsed, id } = mail;
  const headers: [string, string][] = [
    ['From', addressText(parsed.from)],
    ['To', mail.recipients.join(', ')],
    ['Date', timeOf(mail)],
    ['Message-ID', parsed.messageId ?? '—'],
  ];
  const attachments = attachmentsOf(mail).map(
    ({ filename, size }, at) =>
      `<li><a href="/messages/${id}/attachments/${at}">${escapeHtml(filename ?? 'unnamed')}</a> <span>${size} bytes</span></li>`,
  );
  const everyHeader = parsed.headerLines.map(({ line }) => line).join('\n');
  return page(
    parsed.subject ?? 'No subject',
    `<p><a href="/">Mailbox</a></p><h1>${escapeHtml(parsed.subject || 'No subject')}</h1>` +
      `<dl>${headers.map(([name, value]) => `<dt>${name}</dt><dd>${escapeHtml(value)}</dd>`).join('')}</dl>` +
      (attachments.length > 0 ? `<ol>${attachments.join('')}</ol>` : '') +
      (parsed.html ? `<iframe sandbox title="Message as HTML" src="/messages/${id}/html"></iframe>` : '') +
      `<pre>${escapeHtml(parsed.text ?? '')}</pre>` +
      `<details><summary>All headers</summary><pre>${escapeHtml(everyHeader)}</pre></details>`,
  );
}
