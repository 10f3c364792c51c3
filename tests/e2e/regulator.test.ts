import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { unzipSync } from 'fflate';
import { expect, inject, test } from 'vitest';
import { picture, signIn, useBrowser } from './support/browser';
import { signedInFetch } from './support/signedInFetch';

const { open } = useBrowser();

interface Summary {
  stations: { code: string; levels?: { Lday: number | null }; Lday?: number | null }[];
}

test('the regulator downloads a month as PDF and CSV with the figures of the interface', async () => {
  const { page, context } = await open();
  await signIn(page, 'regulator@merrow.example');
  await page.goto('/n/merrow/summaries');
  const month = await page.evaluate(
    () => document.body.innerHTML.match(/summaries\/(\d{4}-\d{2})"/)?.[1] ?? '',
  );
  expect(month).toMatch(/^\d{4}-\d{2}$/);
  await page.goto(`/n/merrow/summaries/${month}`);
  await picture(page, 'regulator-month');

  const downloaded = async (name: 'PDF' | 'CSV') => {
    const waiting = page.waitForEvent('download');
    await page.getByRole('link', { name, exact: true }).click();
    const path = await (await waiting).path();
    return path;
  };
  const archive = unzipSync(readFileSync(await downloaded('CSV')));
  const rows = Object.entries(archive)
    .filter(([name]) => name.endsWith('.csv'))
    .flatMap(
      ([, file]) => parse(Buffer.from(file), { bom: true, columns: true }) as Record<string, string>[],
    );
  expect(rows.length).toBeGreaterThan(100);
  const pdfText = execFileSync('pdftotext', ['-layout', await downloaded('PDF'), '-'], { encoding: 'utf8' });

  const api = await signedInFetch('regulator@merrow.example');
  const summary = (await (
    await api('GET', `/api/v1/networks/merrow/summaries/${month}.json`)
  ).json()) as Summary;
  expect(summary.stations.length).toBeGreaterThanOrEqual(8);
  for (const { code } of summary.stations) {
    expect(pdfText).toContain(code);
    expect(rows.some((row) => Object.values(row).includes(code))).toBe(true);
  }
  for (const text of [pdfText, JSON.stringify(rows), JSON.stringify(summary)]) {
    expect(text).not.toMatch(/residents\.example|Odile Farrow|Piers Halloway/);
  }
  await context.close();
});

test('another network, and no sign-in, are told apart as the contract says', async () => {
  const api = await signedInFetch('regulator@merrow.example');
  expect((await api('GET', '/api/v1/networks/elsewhere/summaries')).status).toBe(404);
  expect((await fetch(`${inject('origin')}/api/v1/networks/merrow/summaries`)).status).toBe(401);
  expect((await api('POST', '/api/v1/networks/merrow/exclusions', {})).status).toBe(403);
});
