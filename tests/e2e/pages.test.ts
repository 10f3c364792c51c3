import { type Page } from 'playwright-core';
import { beforeAll, describe, expect, inject, test } from 'vitest';
import {
  addressOf as addressWith,
  pagePatterns,
  takesForms,
  type Subjects,
} from '#ops/pictures/pagePatterns';
import { faultsOf } from './support/axe';
import { signIn, useBrowser } from './support/browser';
import { ACCESS, APART, expectedStatus, ROLES, type Access } from './support/pageAccess';
import { signedInFetch } from './support/signedInFetch';
import { someSubjects } from './support/subjects';
import { inTabs } from './support/tabs';

const { open } = useBrowser();

/** Everybody's own: what to be sent, a calendar to subscribe to. */
const OWN_FORMS = new Set([
  '/n/[network]/alerts',
  '/n/[network]/alerts/feed',
  '/n/[network]/instruments/settings',
  '/n/[network]/summaries',
]);
/** A page is loaded in the narrow one, where things run sideways, and made wide without loading it again. */
const LOOKS = [
  { theme: 'dark', width: 390 },
  { theme: 'light', width: 1280 },
] as const;
const FORM = 'application/x-www-form-urlencoded';
let subjects: Subjects;

beforeAll(async () => {
  subjects = await someSubjects();
}, 60_000);

function addressOf(pattern: string, network = 'merrow'): string {
  const named = addressWith(pattern, network, subjects);
  if (named === null) throw new Error(`What stands in ${pattern}?`);
  return named;
}

describe('who may open which page', () => {
  test('every page is listed here', () => {
    expect(pagePatterns().filter((pattern) => !APART.has(pattern))).toEqual(Object.keys(ACCESS).sort());
  });

  test.each(ROLES)(
    '%s',
    async (role) => {
      const ask = await signedInFetch(`${role}@merrow.example`);
      for (const [pattern, access] of Object.entries(ACCESS)) {
        if (access === 'public') continue;
        expect((await ask('GET', addressOf(pattern))).status, pattern).toBe(expectedStatus(access, role));
        if (pattern.startsWith('/n/')) {
          expect((await ask('GET', addressOf(pattern, 'elsewhere'))).status, `foreign ${pattern}`).toBe(404);
        }
      }
    },
    120_000,
  );

  test('nobody: every page leads to the sign-in and back, whether it exists or not', async () => {
    for (const [pattern, access] of Object.entries(ACCESS)) {
      const answer = await fetch(`${inject('origin')}${addressOf(pattern)}`, { redirect: 'manual' });
      expect(answer.status, pattern).toBe(access === 'public' ? 200 : 302);
      if (access !== 'public') {
        expect(answer.headers.get('location'), pattern).toBe(
          `/sign-in?next=${encodeURIComponent(addressOf(pattern))}`,
        );
      }
    }
  });

  test('a form sent by somebody without its role is refused', async () => {
    const ask = await signedInFetch('regulator@merrow.example');
    const forms = Object.entries(ACCESS).filter(([pattern]) => takesForms(pattern));
    expect(forms.length).toBeGreaterThan(15);
    for (const [pattern, access] of forms) {
      if (access === 'public' || access === 'signed-in' || OWN_FORMS.has(pattern)) continue;
      const answer = await ask('POST', addressOf(pattern), 'action=nothing', FORM);
      expect(answer.status, pattern).toBe(access === 'administrator' ? 404 : 403);
    }
  });
});

test.each([
  ['operator@merrow.example', (access: Access) => access !== 'administrator' && access !== 'liaison'],
  ['admin@merrow.example', (access: Access) => access === 'administrator' || access === 'liaison'],
] as const)(
  'no accessibility violation and nothing sideways, dark at 390 px and light at 1280 px: pages of %s',
  async (email, who) => {
    const found: string[] = [];
    const [first, ...others] = LOOKS;
    const { page, context } = await open(first);
    await signIn(page, email);
    const patterns = Object.keys(ACCESS).filter((one) => who(ACCESS[one] ?? 'public'));
    await inTabs(page, patterns, async (tab, pattern) => {
      await take(tab, first);
      await tab.goto(addressOf(pattern), { waitUntil: 'load' });
      await tab.waitForTimeout(400);
      found.push(...(await faultsOf(tab)).map((fault) => `${pattern} ${first.theme} ${fault}`));
      for (const look of others) {
        await take(tab, look);
        await tab.waitForTimeout(300);
        found.push(...(await faultsOf(tab)).map((fault) => `${pattern} ${look.theme} ${fault}`));
      }
    });
    await context.close();
    expect(found).toEqual([]);
  },
  900_000,
);

async function take(tab: Page, { theme, width }: { theme: 'light' | 'dark'; width: number }): Promise<void> {
  await tab.emulateMedia({ colorScheme: theme });
  await tab.setViewportSize({ width, height: 860 });
}

test('at 200 % zoom nothing runs sideways', async () => {
  // A window of 1280 px at twice the size has room for 640.
  const { page, context } = await open({ width: 640, height: 430 });
  await signIn(page, 'admin@merrow.example');
  const found: string[] = [];
  await inTabs(page, Object.keys(ACCESS), async (tab, pattern) => {
    await tab.goto(addressOf(pattern), { waitUntil: 'load' });
    const overflowPx = await tab.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    if (overflowPx > 0) found.push(`${pattern} is ${overflowPx} px too wide`);
  });
  expect(found).toEqual([]);
  await context.close();
}, 400_000);
