import { setTimeout as sleep } from 'node:timers/promises';
import type { Page } from 'playwright-core';
import { expect, inject, test } from 'vitest';
import type { Evidence } from '#lib/contracts/complaintEvidence';
import { faultsOf } from './support/axe';
import { picture, signIn, useBrowser } from './support/browser';
import { mailTo } from './support/mailbox';
import { pdfText } from './support/pdfText';
import { signedInFetch } from './support/signedInFetch';

const { open } = useBrowser();

const COMPLAINTS = '/api/v1/networks/merrow/complaints';

/** Last night at a time by the clock of the network, as the form's control takes it. */
function lastNight(clock: string): string {
  const day = new Date(Date.now() - 24 * 3_600_000).toISOString().slice(0, 10);
  return `${day}T${clock}`;
}

/** A resident reports from a phone; answers the reference that the private page tells. */
async function reportFromPhone(email: string, wait: () => Promise<void>): Promise<string> {
  const { page, context } = await open({ width: 390, height: 844 });
  await page.goto('/report/merrow?lang=en');
  await page.getByText('From one time to another').click();
  await page.getByLabel('From', { exact: true }).fill(lastNight('03:10'));
  await page.getByLabel('To', { exact: true }).fill(lastNight('03:40'));
  await page.getByText('A hum, like a fridge or a transformer').click();
  await page.getByLabel('In your own words').fill('A steady hum through the wall.');
  await page.getByLabel('Area').selectOption('elsewhere');
  await page.getByLabel('Coordinates').fill(await nearStation());
  await page.getByLabel('Name').fill('Ines Calder');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('I agree').check();
  await wait();
  await page.getByRole('button', { name: 'Send the report' }).click();
  await page.waitForURL(/\/report\/merrow\/[\w-]{43}/);
  const reference = /[A-Z]{3}-\d{4}-\d{4}/.exec(await page.content())?.[0];
  if (!reference) throw new Error('The private page tells no reference.');
  await context.close();
  return reference;
}

/** A place some 200 m from a station. */
async function nearStation(): Promise<string> {
  const api = await signedInFetch('liaison@merrow.example');
  const { items } = (await (await api('GET', '/api/v1/networks/merrow/stations')).json()) as {
    items: { code: string; latitude: number; longitude: number }[];
  };
  const station = items.find(({ code }) => code === 'MER-02');
  if (!station) throw new Error('The demo has no MER-02.');
  return `${(station.latitude + 0.0018).toFixed(5)}, ${station.longitude.toFixed(5)}`;
}

async function expectAccessible(page: Page): Promise<void> {
  expect(await faultsOf(page)).toEqual([]);
}

test('a resident reports a night’s noise from a phone; the answer arrives with a PDF whose figures are the interface’s', async () => {
  const email = `ines.${Date.now()}@residents.example`;
  // A form that is sent at once was not filled in by a person.
  const reference = await reportFromPhone(email, () => sleep(4500));

  const { page, context } = await open();
  await signIn(page, 'liaison@merrow.example');
  await page.goto(`/n/merrow/complaints/${reference}`);
  await picture(page, 'answering-case');
  await page.getByRole('link', { name: 'Write the answer' }).click();
  const letter = page.getByLabel('Letter');
  expect(await letter.inputValue()).toContain('{{measured}}');

  await letter.fill(`${await letter.inputValue()}\n\nP.S. It was 43.1 dB.`);
  await page.getByRole('button', { name: 'Keep and preview' }).click();
  await page.waitForURL(/kept/);
  expect(await page.getByText('level typed by hand').count()).toBe(1);
  expect(await page.getByRole('button', { name: `Send to ${email}` }).count()).toBe(0);

  await letter.fill((await letter.inputValue()).replace('It was 43.1 dB.', 'The average was {{laeq}}.'));
  await page.getByLabel('Wind and what the instrument flagged').uncheck();
  await page.getByRole('button', { name: 'Keep and preview' }).click();
  await page.waitForURL(/kept/);
  const preview = (await page.locator('[data-letter]').innerText()).trim();
  expect(preview).toMatch(/P\.S\. The average was \d+\.\d dB\(A\)\./);
  expect(await page.getByLabel('Wind and what the instrument flagged').isChecked()).toBe(false);
  await expectAccessible(page);
  await picture(page, 'answering-preview');
  await page.getByRole('button', { name: `Send to ${email}` }).click();
  await page.waitForURL(({ pathname }) => pathname.endsWith(`complaints/${reference}`));

  const mail = await mailTo(email, ({ subject }) => subject === `Your noise report ${reference}`);
  expect(mail.messageId).toContain(reference);
  expect(mail.text.replace(/\s+/g, ' ').trim()).toBe(preview.replace(/\s+/g, ' '));
  const attachment = await fetch(`${inject('mailOrigin')}/messages/${mail.id}/attachments/0`);
  const text = await pdfText(new Uint8Array(await attachment.arrayBuffer()));
  const api = await signedInFetch('liaison@merrow.example');
  const { evidence } = (await (await api('GET', `${COMPLAINTS}/${reference}`)).json()) as {
    evidence: Evidence;
  };
  expect(evidence.stations[0]?.station).toBe('MER-02');
  for (const { name, LAeq, LAFmax, LA90 } of evidence.stations) {
    const row = [name, ...[LAeq, LAFmax].map((level) => level?.toFixed(1) ?? '—')].join(' ');
    expect(text).toContain(row);
    expect(text).toContain(LA90?.toFixed(1) ?? '—');
  }
  expect(text).toContain(evidence.digest);
  expect(text).not.toContain('Weather and the instrument');
  await context.close();
});

test('four eyes: who wrote an answer cannot approve it, and an answer received is filed', async () => {
  const { page, context } = await open();
  await signIn(page, 'liaison@merrow.example');
  const api = await signedInFetch('liaison@merrow.example');
  const logged = await api('POST', COMPLAINTS, {
    from: `${lastNight('03:10')}:00Z`,
    to: `${lastNight('03:40')}:00Z`,
    kind: 'hum',
    station: 'MER-02',
    contact: { name: 'Ines Calder', email: 'ines@residents.example' },
  });
  const { reference } = ((await logged.json()) as { complaint: { reference: string } }).complaint;
  const setApproval = async (isNeeded: boolean) => {
    await page.goto('/n/merrow/complaints/letters');
    await page.getByLabel('A second person approves').setChecked(isNeeded);
    await page.getByRole('button', { name: 'Keep', exact: true }).click();
    await page.waitForURL(/saved/);
  };
  await setApproval(true);
  await expectAccessible(page);
  await picture(page, 'answering-letters');

  await page.goto(`/n/merrow/complaints/${reference}/answer`);
  await page.getByRole('button', { name: 'Keep and preview' }).click();
  await page.waitForURL(/kept/);
  await page.getByRole('button', { name: 'Submit to a second person' }).click();
  await page.getByText('Submitted by').waitFor();
  expect(await page.getByRole('button', { name: /^Approve/ }).count()).toBe(0);

  const other = await open({ width: 390, height: 844 });
  await signIn(other.page, 'admin@merrow.example');
  await other.page.goto('/n/merrow/complaints');
  await other.page.getByRole('link', { name: /^To approve \d+/ }).press('Enter');
  await other.page.waitForURL(/status=to-approve/);
  await expectAccessible(other.page);
  await picture(other.page, 'answering-to-approve');
  await other.page
    .getByRole('row')
    .filter({ hasText: reference })
    .getByRole('link', { name: /^Approve the answer/ })
    .press('Enter');
  await other.page.waitForURL(new RegExp(`${reference}/answer$`));
  await other.page.getByRole('button', { name: 'Approve and send to ines@residents.example' }).click();
  await other.page.waitForURL(new RegExp(`complaints/${reference}$`));
  expect(await other.page.getByText('approved by').count()).toBe(1);
  await other.context.close();

  await page.goto(`/n/merrow/complaints/${reference}`);
  await page.getByText('File a message that came in').click();
  await page.getByLabel('What was said or written').fill('She rang: it was back last night.');
  await page.getByRole('button', { name: 'File the note' }).click();
  await page.getByText('noted, filed by').waitFor();
  await picture(page, 'answering-received');
  await setApproval(false);
  await context.close();
});
