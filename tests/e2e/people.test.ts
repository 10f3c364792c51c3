import { Secret, TOTP } from 'otpauth';
import { type Page } from 'playwright-core';
import { expect, inject, test } from 'vitest';
import { faultsOf } from './support/axe';
import { picture, signIn, useBrowser } from './support/browser';
import { mailTo } from './support/mailbox';

const { open } = useBrowser();

const PASSWORD = 'nine grey geese over water';
const LOOKS = [
  ['light', 1280],
  ['dark', 390],
] as const;

/** The code of a secret, `steps` of 30 s from now. */
function codeOf(secret: string, steps: number): string {
  const totp = new TOTP({ secret: Secret.fromBase32(secret.replace(/\s/g, '')) });
  return totp.generate({ timestamp: Date.now() + steps * 30_000 });
}

/** No accessibility violation, nothing sideways, and a picture, of the page as it is, in both themes. */
async function look(page: Page, name: string): Promise<void> {
  for (const [theme, width] of LOOKS) {
    await page.emulateMedia({ colorScheme: theme });
    await page.setViewportSize({ width, height: 860 });
    expect(await faultsOf(page), `${name}, ${theme}`).toEqual([]);
    const sideways = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(sideways, `${name}, ${width} px`).toBeLessThanOrEqual(0);
    await picture(page, `people-${name}-${theme}-${width}`);
  }
  await page.emulateMedia({ colorScheme: 'light' });
  await page.setViewportSize({ width: 1280, height: 860 });
}

async function giveEmailAndPassword(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL('**/sign-in/code?**');
}

async function giveCode(page: Page, code: string): Promise<void> {
  await page.getByLabel('Code', { exact: true }).fill(code);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

test('invited by e-mail, in with a password, a second factor set up, back by code and by recovery code', async () => {
  const email = `ines-${Date.now()}@people.example`;
  const admin = await open();
  await signIn(admin.page, 'admin@merrow.example');
  await admin.page.goto('/admin/people');
  await admin.page.getByRole('link', { name: 'Invite a person' }).first().click();
  await admin.page.getByLabel('Name', { exact: true }).fill('Ines Valcourt');
  await admin.page.getByLabel('E-mail').fill(email);
  await admin.page.locator('input[name=roles][value="merrow liaison"]').check();
  await look(admin.page, 'invite');
  await admin.page.getByRole('button', { name: 'Send the invitation' }).click();
  await admin.page.getByText('The invitation is on its way').waitFor();
  await look(admin.page, 'invitations');

  const invitation = await mailTo(email, ({ text }) => text.includes('/join/'));
  const link = /\/join\/[\w-]+/.exec(invitation.text)?.[0] ?? '';
  expect((await fetch(`${inject('origin')}${link}`)).headers.get('referrer-policy')).toBe('no-referrer');

  const { context, page } = await open();
  await page.goto(link);
  await look(page, 'join');
  await page.getByLabel('Password').fill('merrow-estuary-1');
  await page.getByRole('button', { name: 'Show' }).click();
  expect(await page.getByLabel('Password').getAttribute('type')).toBe('text');
  await page.getByRole('button', { name: 'Join' }).click();
  await page
    .getByText(/names that anybody knows/)
    .first()
    .waitFor();
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Join' }).click();
  await page.waitForURL('**/n/merrow/map');

  await page.goto('/account/second-factor');
  await page.getByRole('button', { name: 'Set up a second factor' }).click();
  const secret = await page.locator('main code').innerText();
  await look(page, 'factor-setup');
  await page.getByLabel('Code', { exact: true }).fill('000000');
  await page.getByRole('button', { name: 'Put it into force' }).click();
  await page
    .getByText(/is not the code that holds now/)
    .first()
    .waitFor();
  await page.getByLabel('Code', { exact: true }).fill(codeOf(secret, -1));
  await page.getByRole('button', { name: 'Put it into force' }).click();
  await page.getByText('Your recovery codes').waitFor();
  const recoveryCodes = await page.locator('main li code').allInnerTexts();
  expect(recoveryCodes).toHaveLength(10);
  await look(page, 'recovery-codes');
  await page.reload();
  expect(await page.content()).not.toContain(recoveryCodes[0]);
  await page.goto('/account');
  await look(page, 'account');

  await page.getByRole('button', { name: 'Sign out' }).first().click();
  await page.waitForURL('**/sign-in');
  await giveEmailAndPassword(page, email);
  await look(page, 'code');
  await giveCode(page, '000000');
  await page.getByText(/does not hold now/).waitFor();
  await giveCode(page, codeOf(secret, 0));
  await page.waitForURL('**/n/merrow/map');

  await page.getByRole('button', { name: 'Sign out' }).first().click();
  await page.waitForURL('**/sign-in');
  await giveEmailAndPassword(page, email);
  await giveCode(page, recoveryCodes[0] ?? '');
  await page.waitForURL('**/n/merrow/map');
  await page.goto(link);
  await page.getByText('This link does not hold').waitFor();
  await look(page, 'link-over');

  await admin.page.goto('/admin/people?text=Ines');
  await admin.page.getByRole('link', { name: 'Ines Valcourt' }).first().click();
  await admin.page.getByText('Take the second factor away', { exact: true }).click();
  await look(admin.page, 'person');
  await admin.page.goto('/admin/networks/merrow');
  await look(admin.page, 'network');
  await context.close();
  await admin.context.close();
}, 240_000);

test('a forgotten password is chosen anew by a link, without JavaScript', async () => {
  const { context, page } = await open();
  await page.route('**/*.js', (route) => route.abort());
  await page.goto('/forgotten');
  await look(page, 'forgotten');
  await page.getByLabel('E-mail').fill('nobody@people.example');
  await page.getByRole('button', { name: 'Send the link' }).click();
  await page.getByText('If the address is somebody’s').waitFor();
  await look(page, 'asked');
  await context.close();
}, 60_000);

test('a password that was handed over is changed before anything opens, without JavaScript', async () => {
  const email = `odo-${Date.now()}@people.example`;
  const admin = await open();
  await signIn(admin.page, 'admin@merrow.example');
  const handed = 'eleven slow barges upstream';
  const added = await admin.context.request.post('/api/v1/people', {
    data: { name: 'Odo', email, password: handed, roles: [{ network: 'merrow', role: 'regulator' }] },
    headers: { origin: inject('origin') },
  });
  expect(added.status()).toBe(201);
  await admin.context.close();

  const { context, page } = await open();
  await page.route('**/*.js', (route) => route.abort());
  await page.goto('/sign-in?next=/n/merrow/limits');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(handed);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL('**/account/new-password?next=%2Fn%2Fmerrow%2Flimits');
  await look(page, 'handed-over');
  for (const path of ['/', '/account', '/account/second-factor', '/summaries', '/n/merrow/map']) {
    await page.goto(path);
    expect(new URL(page.url()).pathname, path).toBe('/account/new-password');
  }
  await page.goto('/sign-in?next=/n/merrow/limits');
  const change = page.getByRole('button', { name: 'Change the password' });
  await page.getByLabel('Current password').fill(handed);
  await page.getByLabel('New password').fill(handed);
  await change.click();
  await page.getByText('must differ from the current one').first().waitFor();
  await page.getByLabel('Current password').fill(handed);
  await page.getByLabel('New password').fill(PASSWORD);
  await change.click();
  await page.waitForURL('**/n/merrow/limits');
  await page.goto('/account/new-password');
  expect(new URL(page.url()).pathname).toBe('/account');
  await context.close();
}, 120_000);
