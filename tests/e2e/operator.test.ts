import { expect, inject, test } from 'vitest';
import { faultsOf } from './support/axe';
import { picture, signIn, useBrowser } from './support/browser';
import { mailTo } from './support/mailbox';
import { minutes, post } from './support/posts';
import { signedInFetch } from './support/signedInFetch';

const { open } = useBrowser();
const QUARTER_SEC = 900;
/** How long a page may take on a busy machine. */
const SLOW = { timeout: 30_000 };

/** As a date-and-time field takes it, in the demo's zone. */
function localText(sec: number): string {
  const parts = new Intl.DateTimeFormat('sv-SE', {
    timeZone: 'Europe/London',
    dateStyle: 'short',
    timeStyle: 'short',
  });
  return parts.format(new Date(sec * 1000)).replace(' ', 'T');
}

/** Chooses that messages about exceedances come one by one, however many there are. */
async function wantEachAtOnce(email: string): Promise<void> {
  const ask = await signedInFetch(email);
  const form = 'delivery=at-once&dailyAt=07:00&groupMinutes=0';
  const answer = await ask('POST', '/n/merrow/alerts', form, 'application/x-www-form-urlencoded');
  expect(await answer.text()).toContain('Saved.');
}

test('the operator registers a station by a pin, connects it, limits it, and follows an alert to its acknowledgement', async () => {
  await wantEachAtOnce('operator@merrow.example');
  const { page, context } = await open({ height: 1000 });
  await signIn(page, 'operator@merrow.example');
  await page.goto('/n/merrow/stations');
  await page.getByRole('link', { name: /Register a station|Add a station/ }).click();
  await page.waitForURL(/\/stations\/new/);

  await page.getByLabel('Name', { exact: true }).fill('Lock Cottage');
  await page.getByLabel('Code', { exact: true }).fill('MER-01');
  const map = page.locator('.maplibregl-canvas');
  await map.waitFor();
  await map.click({ position: { x: 200, y: 120 } });
  const latitude = page.getByLabel('Latitude');
  await expect.poll(() => latitude.inputValue(), SLOW).toMatch(/^5\d\.\d{3,}$/);
  await page.getByLabel('Longitude').fill('east');
  await page.getByLabel('Octaves', { exact: true }).check();
  await page.getByLabel('Lowest band').selectOption({ label: '31.5 Hz' });
  await page.getByLabel('Highest band').selectOption({ label: '8 kHz' });
  await page.getByRole('button', { name: 'Register the station' }).click();
  // What is wrong is said beside its field, and what was typed stays.
  await expect.poll(() => page.getByRole('alert').count(), SLOW).toBeGreaterThan(0);
  expect(await page.getByLabel('Name', { exact: true }).inputValue()).toBe('Lock Cottage');
  await picture(page, 'register-wrong');
  await page.getByLabel('Code', { exact: true }).fill('MER-21');
  await page.getByLabel('Longitude').fill('-1.5');
  await page.getByRole('button', { name: 'Register the station' }).click();
  await page.waitForURL(/\/stations\/MER-21\/connect/);

  await page.getByRole('button', { name: /Issue/ }).click();
  const shown = page.getByRole('region', { name: 'The new token, shown this once' });
  const token = (await shown.locator('code, pre, input, output').first().innerText()).trim();
  expect(token.length).toBeGreaterThan(20);
  expect(page.url()).not.toContain(token);
  await page.getByText('Waiting for the first post').waitFor();
  await picture(page, 'connect');

  const lastQuarterSec = Math.floor(Date.now() / 1000 / QUARTER_SEC - 1) * QUARTER_SEC;
  const answer = await post(token, minutes(lastQuarterSec - QUARTER_SEC, 15, 45));
  expect(answer.status).toBe(200);
  await page.getByText('First post arrived:', { exact: true }).waitFor({ timeout: 40_000 });
  await page.reload();
  expect(await page.content()).not.toContain(token);

  await page.goto('/n/merrow/limits');
  await page.getByRole('link', { name: 'Set a limit' }).click();
  await page.getByLabel('Name', { exact: true }).fill('Quiet at the lock');
  await page.getByLabel('Limit', { exact: true }).fill('52.5');
  await page.getByLabel('Only those chosen here').check();
  await page.getByLabel(/MER-21/).check();
  await page.getByLabel(/Who gets e-mail/).fill('operator@merrow.example');
  await page.getByLabel(/In force from/).fill(localText(lastQuarterSec - QUARTER_SEC));
  await page.getByRole('button', { name: 'Set the limit' }).click();
  await page.waitForURL(/\/limits(\/\d+)?$/);
  await picture(page, 'limit-set');

  expect((await post(token, minutes(lastQuarterSec, 15, 61.4))).status).toBe(200);
  const mail = await mailTo('operator@merrow.example', ({ text }) => text.includes('Quiet at the lock'));
  expect(mail.subject).toContain('above the limit by 8.9 dB');
  expect(mail.text).toContain('61.4');
  // A mail scanner that opens the link acknowledges nothing.
  const byMail = /\/acknowledge\/[\w.-]+/.exec(mail.text)?.[0] ?? '';
  const scanned = await fetch(`${inject('origin')}${byMail}`);
  expect(scanned.status).toBe(200);
  expect(await scanned.text()).toContain('Nothing has been noted yet');
  for (const [theme, width] of [
    ['light', 1280],
    ['dark', 390],
  ] as const) {
    const stranger = await open({ theme, width });
    await stranger.page.goto(byMail);
    await stranger.page.getByText('Nothing has been noted yet').waitFor();
    expect(await faultsOf(stranger.page), `${theme}, ${width} px`).toEqual([]);
    await stranger.context.close();
  }
  const link = /\/n\/merrow\/exceedances\/\d+/.exec(mail.text)?.[0] ?? '';
  await page.goto(link);
  expect(await page.getByRole('heading', { level: 1 }).innerText()).toMatch(/Lock Cottage|Quiet at the lock/);
  expect(await page.locator('main').innerText()).toContain('61.4');
  await picture(page, 'exceedance');
  await page.getByLabel(/Note/).fill('Rang the lock: a pump on trial, stopped at noon.');
  await page.getByRole('button', { name: /Acknowledge/ }).click();
  await page.getByText('Rang the lock: a pump on trial').first().waitFor();
  await page.goto('/n/merrow/exceedances');
  await picture(page, 'exceedances');
  await context.close();
}, 240_000);
