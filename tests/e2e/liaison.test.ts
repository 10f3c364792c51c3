import { expect, test } from 'vitest';
import { picture, signIn, useBrowser } from './support/browser';
import { mailTo } from './support/mailbox';

const { open } = useBrowser();

const RESIDENT = 'odile.brandt@residents.example';

/** A quarter past three last night, local time, as the form's control takes it. */
function lastNight(hour: number, minute: number): string {
  const day = new Date(Date.now() - 24 * 3_600_000).toISOString().slice(0, 10);
  return `${day}T${String(hour).padStart(2, '0')}:${String(minute).padStart(2, '0')}`;
}

test('the liaison logs a complaint, sees the figures of that window, and answers; the mail arrives', async () => {
  const { page, context } = await open();
  await signIn(page, 'liaison@merrow.example');
  await page.goto('/n/merrow/complaints');
  await page.getByRole('link', { name: 'Log a complaint' }).click();

  await page.getByLabel('From').fill(lastNight(3, 15));
  await page.getByLabel('To', { exact: true }).fill(lastNight(4, 5));
  await page.getByText('Hum', { exact: true }).click();
  await page.getByLabel('In their own words').fill('A steady low hum in the bedroom.');
  await page.getByLabel('Nearest station').selectOption('MER-02');
  await page.getByLabel('E-mail').fill('not an address');
  await page.getByRole('button', { name: /log/i }).click();
  expect(await page.getByText('must be an e-mail address').count()).toBeGreaterThan(0);
  expect(await page.getByLabel('In their own words').inputValue()).toBe('A steady low hum in the bedroom.');

  await page.getByLabel('Name').fill('Odile Brandt');
  await page.getByLabel('E-mail').fill(RESIDENT);
  await page.getByRole('button', { name: /log/i }).click();
  await page.waitForURL(/complaints\/[A-Z]+-\d{4}-\d+/);
  const reference = page.url().split('/').at(-1) ?? '';
  expect(await page.getByRole('heading', { name: /Silo Lane/ }).count()).toBe(1);
  await picture(page, 'liaison-complaint');
  await page.getByRole('link', { name: 'Write the answer' }).click();
  const letter = page.getByLabel('Letter');
  await letter.fill(`${await letter.inputValue()}\nP.S. Thank you for telling us.`);
  await page.getByRole('button', { name: 'Keep and preview' }).click();
  await page.waitForURL(/kept/);
  const draft = await page.locator('[data-letter]').innerText();
  expect(draft).toContain(reference);
  expect(draft).toMatch(/\d+\.\d dB/);
  await page.getByRole('button', { name: `Send to ${RESIDENT}` }).click();
  await page.waitForLoadState();
  expect(await page.getByText('Thank you for telling us').count()).toBeGreaterThan(0);

  const mail = await mailTo(RESIDENT);
  expect(mail.subject).toBe(`Your noise report ${reference}`);
  expect(mail.text).toContain('Thank you for telling us.');
  expect(mail.text.replace(/\s+/g, ' ')).toContain(draft.slice(0, 200).replace(/\s+/g, ' ').trim());
  await context.close();
});

test('a regulator sees that there was a complaint, and nothing of the person', async () => {
  const { page, context } = await open();
  await signIn(page, 'regulator@merrow.example');
  await page.goto('/n/merrow/complaints');
  const first = page.getByRole('link', { name: /[A-Z]+-\d{4}-\d+/ }).first();
  await first.click();
  await page.waitForURL(/complaints\/[A-Z]+-\d{4}-\d+/);
  const html = await page.content();
  expect(html).not.toMatch(/residents\.example|Odile|bedroom/);
  expect(await page.getByLabel('Letter').count()).toBe(0);
  expect((await page.goto('/n/merrow/complaints/new'))?.status()).toBe(403);
  await context.close();
});
