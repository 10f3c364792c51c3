import { expect, inject, test } from 'vitest';
import { faultsOf } from './support/axe';
import { signIn, useBrowser } from './support/browser';
import { signedInFetch } from './support/signedInFetch';

const { open } = useBrowser();

/** What the demo's residents wrote or are called: nobody but liaison and administrator may be sent any of it. */
const PERSONAL =
  /residents\.example|Odile Farrow|Piers Halloway|Greta Lindqvist|bed frame|The hum from the silo/;

/** A demo complaint that has a person behind it, and a month that has data. */
async function someReference(): Promise<{ reference: string; month: string }> {
  const api = await signedInFetch('liaison@merrow.example');
  const { items } = (await (await api('GET', '/api/v1/networks/merrow/complaints?status=open')).json()) as {
    items: { reference: string }[];
  };
  const months = (await (await api('GET', '/api/v1/networks/merrow/summaries')).json()) as {
    items: { month: string }[];
  };
  return { reference: items[0]?.reference ?? '', month: months.items[0]?.month ?? '' };
}

test.each([
  ['liaison@merrow.example', true],
  ['admin@merrow.example', true],
  ['operator@merrow.example', false],
  ['regulator@merrow.example', false],
])('%s: pages and forms of the desk, and who is behind a complaint', async (email, mayReadPersonalData) => {
  const { reference, month } = await someReference();
  const { page, context } = await open();
  await signIn(page, email);
  const base = '/n/merrow';
  const expected: [string, number][] = [
    [`${base}/complaints`, 200],
    [`${base}/complaints/${reference}`, 200],
    [`${base}/complaints/new`, mayReadPersonalData ? 200 : 403],
    [`${base}/complaints/MER-1999-0001`, 404],
    [`${base}/summaries`, 200],
    [`${base}/summaries/${month}`, 200],
    [`${base}/summaries/2026-13`, 404],
    ['/n/elsewhere/complaints', 404],
    [`/n/elsewhere/complaints/${reference}`, 404],
    ['/n/elsewhere/summaries', 404],
  ];
  for (const [path, status] of expected) {
    const answer = await page.goto(path);
    expect(answer?.status(), path).toBe(status);
    const isPersonal = PERSONAL.test(await page.content());
    expect(isPersonal, path).toBe(mayReadPersonalData && path === `${base}/complaints/${reference}`);
    if (isPersonal) expect(answer?.headers()['cache-control']).toBe('private, no-store');
  }
  const post = (form: Record<string, string>) =>
    context.request.post(`${base}/complaints/${reference}`, { form });
  const refusedStatus = mayReadPersonalData ? 409 : 403;
  const wrong: Record<string, string>[] = [
    { action: 'erase', confirmation: 'something else' },
    { action: 'reply', text: '', figuresDigest: '', repliesSoFar: '0' },
    { action: 'contact', email: 'no address' },
    { action: 'close', reason: 'erased' },
    { action: 'nothing' },
  ];
  for (const form of wrong) {
    const answer = await post(form);
    expect(answer.status(), form.action).toBe(refusedStatus);
    if (!mayReadPersonalData) expect(PERSONAL.test(await answer.text()), form.action).toBe(false);
  }
  const foreign = await context.request.post(`/n/elsewhere/complaints/${reference}`, {
    form: { action: 'erase', confirmation: reference },
  });
  expect(foreign.status()).toBe(404);
  await context.close();
});

test('without signing in the desk leads to the sign-in page, and back afterwards', async () => {
  const answer = await fetch(`${inject('origin')}/n/merrow/complaints`, { redirect: 'manual' });
  expect(answer.status).toBe(302);
  expect(answer.headers.get('location')).toBe('/sign-in?next=%2Fn%2Fmerrow%2Fcomplaints');
});

test('the desk has no accessibility violations and nothing sideways, in both themes, wide and narrow', async () => {
  const { reference, month } = await someReference();
  const { page, context } = await open({ theme: 'light', width: 390 });
  await signIn(page, 'liaison@merrow.example');
  for (const path of [
    '/n/merrow/complaints?status=all',
    '/n/merrow/complaints/new',
    `/n/merrow/complaints/${reference}`,
    '/n/merrow/summaries',
    `/n/merrow/summaries/${month}`,
  ]) {
    await page.goto(path, { waitUntil: 'networkidle' });
    for (const width of [390, 1280]) {
      for (const theme of ['light', 'dark'] as const) {
        await page.setViewportSize({ width, height: 860 });
        await page.emulateMedia({ colorScheme: theme });
        await page.waitForTimeout(300);
        expect(await faultsOf(page), `${path}, ${theme}, ${width} px`).toEqual([]);
      }
    }
    await page.setViewportSize({ width: 390, height: 860 });
  }
  await context.close();
}, 240_000);
