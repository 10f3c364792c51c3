import { expect, test } from 'vitest';
import { picture, signIn, useBrowser } from './support/browser';
import { mailTo } from './support/mailbox';

const { open } = useBrowser();

const RESIDENT = 'odile.brandt@residents.example';

test('the liaison logs a complaint, sees the figures of that window, and answers; the mail arrives', async () => {
  const { page, context } = await open();
  await signIn(page, 'liaison@merrow.example');
  await page.goto('/n/merrow/complaints');
  await page.getByRole('link', { name: 'Log a complaint' }).click();

  await page.getByRole('textbox', { name: 'When' }).fill('last night 3:15-4:05');
  await page.getByLabel('What it sounds like').selectOption('hum');
  await page.getByLabel('In their own words').fill('A steady low hum in the bedroom.');
  await page.getByLabel('Area').selectOption('Around Silo Lane');
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

test('a caller’s complaint is logged by the keyboard alone, in few enough keys for a minute', async () => {
  const { page, context } = await open();
  await signIn(page, 'liaison@merrow.example');
  await page.goto('/n/merrow/complaints/new');
  await page.getByRole('textbox', { name: 'When' }).waitFor();
  let keys = 0;
  const press = async (key: string) => {
    keys += 1;
    await page.keyboard.press(key);
  };
  const type = async (text: string) => {
    for (const letter of text) await press(letter === ' ' ? 'Space' : letter);
  };
  await type('last night about 3');
  const sound = page.getByLabel('What it sounds like');
  while (!(await sound.evaluate((field) => field === document.activeElement))) await press('Tab');
  await press('h');
  await press('Tab');
  await type('around s');
  while (
    !(await page.getByLabel('In their own words').evaluate((field) => field === document.activeElement))
  ) {
    await press('Tab');
  }
  await type('low hum');
  await press('Tab');
  await type('Mara Finch');
  await press('Tab');
  await press('Tab');
  await type('0555 0177');
  await press('Enter');
  await page.waitForURL(/complaints\/[A-Z]+-\d{4}-\d+/);
  expect(await page.getByText('Mara Finch').count()).toBeGreaterThan(0);
  expect(await page.getByText(/03:30|02:30/).count()).toBeGreaterThan(0);
  // At two keys a second, slow for somebody who types while listening.
  expect(keys).toBeLessThanOrEqual(120);
  await context.close();
});
