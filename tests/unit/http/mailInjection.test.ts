import { createTransport } from 'nodemailer';
import { expect, test } from 'vitest';
import { noteHtml, noteText } from '#lib/services/mails/note';

/** What somebody may have typed as a name, a place or a reason. */
const HOSTILE =
  'Quay\r\nBcc: thief@elsewhere.example\r\n\r\n<script>alert(1)</script>"><img src=x onerror=alert(1)>';

const note = {
  subject: HOSTILE,
  opening: HOSTILE,
  facts: [[HOSTILE, HOSTILE]] as const,
  link: { label: HOSTILE, url: `https://noise.merrow.example/?q="><script>` },
  closing: HOSTILE,
};

async function rawMessage(): Promise<string> {
  const transport = createTransport({ streamTransport: true, buffer: true, newline: 'unix' });
  const sent = await transport.sendMail({
    from: 'Bittern <bittern@merrow.example>',
    to: 'operator@merrow.example',
    subject: note.subject,
    text: noteText(note),
    html: noteHtml(note),
  });
  return String(sent.message);
}

test('no typed text becomes a header of a message', async () => {
  const [head = ''] = (await rawMessage()).split('\n\n');
  expect(head).toMatch(/^To: operator@merrow\.example$/m);
  expect(head).not.toMatch(/^Bcc:/im);
});

test('nor markup of it', () => {
  const html = noteHtml(note);
  expect(html).not.toContain('<script');
  expect(html).not.toContain('<img');
  expect(html).toContain('&lt;script&gt;');
});
