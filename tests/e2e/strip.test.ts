import { readFileSync } from 'node:fs';
import Papa from 'papaparse';
import { type Locator, type Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { formatDifferenceDb } from '#lib/format/levels';
import { picture, signIn, useBrowser } from './support/browser';
import { signedInFetch } from './support/signedInFetch';

const { open } = useBrowser();
/** How long a page may take on a busy machine. */
const SLOW = { timeout: 30_000 };
const STATIONS = '/n/merrow/stations';

/** A date as its day begins by UTC, which winter's clock in London is too. */
const dateDaysAgo = (days: number) => new Date(Date.now() - days * 86_400_000).toISOString().slice(0, 10);
const dayQuery = (days: number) => `from=${dateDaysAgo(days)}T00:00&to=${dateDaysAgo(days - 1)}T00:00`;

interface Statistics {
  LAeq: number;
  coverage: number;
}

async function statistics(code: string, query: string): Promise<Statistics> {
  const api = await signedInFetch('operator@merrow.example');
  return (await (
    await api('GET', `/api/v1/networks/merrow/stations/${code}/statistics?${query}`)
  ).json()) as Statistics;
}

/** Drags between two places, shares of the strip's width and pixels from its top. */
async function drag(page: Page, strip: Locator, from: [number, number], to: [number, number]): Promise<void> {
  const box = await strip.boundingBox();
  if (!box) throw new Error('The strip has no place.');
  await page.mouse.move(box.x + box.width * from[0], box.y + from[1]);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width * to[0], box.y + to[1], { steps: 8 });
  await page.mouse.up();
  await page.waitForURL(/#selection=/);
}

const periodOfSlip = async (slip: Locator) => {
  const href = (await slip.getByRole('link', { name: 'CSV' }).getAttribute('href')) ?? '';
  return href.split('?')[1] ?? '';
};

test('two stations under one another: one selection, two slips, and their difference', async () => {
  const { page, context } = await open({ width: 1280, height: 1400 });
  await signIn(page, 'operator@merrow.example');
  await page.goto(`${STATIONS}/MER-02?${dayQuery(4)}`);
  await page.getByText('Compare with another station or period').click();
  await page.getByLabel('Station below').selectOption('MER-03');
  await page.getByRole('button', { name: 'Show', exact: true }).click();
  await page.waitForURL(/with=MER-03/);
  const strips = page.getByRole('application');
  await expect.poll(() => strips.count(), SLOW).toBe(2);
  await drag(page, strips.first(), [0.4, 60], [0.6, 360]);
  const slips = page.getByRole('complementary').filter({ hasText: 'covered' });
  await expect.poll(() => slips.count(), SLOW).toBe(2);
  const period = await periodOfSlip(slips.nth(0));
  const [above, below] = [await statistics('MER-02', period), await statistics('MER-03', period)];
  await expect.poll(() => slips.nth(0).innerText(), SLOW).toContain(above.LAeq.toFixed(1));
  await expect.poll(() => slips.nth(1).innerText(), SLOW).toContain(below.LAeq.toFixed(1));
  await expect
    .poll(() => slips.nth(1).innerText(), SLOW)
    .toContain(formatDifferenceDb(below.LAeq - above.LAeq));
  await picture(page, 'strip-two-stations');
  await context.close();
});

test('two periods of a station under one another: the lower strip’s time is its own', async () => {
  const { page, context } = await open({ width: 1280, height: 1400 });
  await signIn(page, 'operator@merrow.example');
  await page.goto(`${STATIONS}/MER-02?${dayQuery(4)}`);
  await page.getByText('Compare with another station or period').click();
  await page.getByLabel('Its period begins on').fill(dateDaysAgo(6));
  await page.getByRole('button', { name: 'Show', exact: true }).click();
  await page.waitForURL(new RegExp(`against=${dateDaysAgo(6)}`));
  const strips = page.getByRole('application');
  await expect.poll(() => strips.count(), SLOW).toBe(2);
  await drag(page, strips.first(), [0.3, 60], [0.5, 360]);
  const slips = page.getByRole('complementary').filter({ hasText: 'covered' });
  await expect.poll(() => slips.count(), SLOW).toBe(2);
  const upper = new URLSearchParams(await periodOfSlip(slips.nth(0)));
  const lower = new URLSearchParams(await periodOfSlip(slips.nth(1)));
  expect(Date.parse(upper.get('from') ?? '') - Date.parse(lower.get('from') ?? '')).toBe(2 * 86_400_000);
  const earlier = await statistics('MER-02', lower.toString());
  await expect.poll(() => slips.nth(1).innerText(), SLOW).toContain(earlier.LAeq.toFixed(1));
  await picture(page, 'strip-two-periods');
  await context.close();
});

test('a rectangle of time and bands: its slip tells the bands’ level and part of the energy, and its link leads back', async () => {
  const { page, context } = await open({ width: 1280, height: 1000 });
  await signIn(page, 'operator@merrow.example');
  await page.goto(`${STATIONS}/MER-02?${dayQuery(3)}`);
  const strip = page.getByRole('application');
  await strip.waitFor();
  await expect.poll(() => page.getByText(/dB \(Z\) a band/).count(), SLOW).toBe(1);
  await drag(page, strip, [0.5, 120], [0.7, 190]);
  expect(decodeURIComponent(page.url())).toMatch(/#selection=\S+\/[\d.]+-[\d.]+$/);
  const slip = page.getByRole('complementary').filter({ hasText: 'Zoom here' });
  await expect.poll(() => slip.innerText(), SLOW).toMatch(/of all energy, Z \/ A/);
  await expect.poll(() => slip.innerText(), SLOW).toMatch(/[\d.]+\s?% \/ [\d.]+\s?%/);
  await expect.poll(() => slip.innerText(), SLOW).not.toContain('from the screen');
  const heading = await slip.getByRole('heading').innerText();
  expect(heading).toMatch(/\d+–\d+ Hz|kHz/);
  await picture(page, 'strip-rectangle');
  const link = page.url();
  await page.goto('about:blank');
  await page.goto(link);
  await expect.poll(() => slip.getByRole('heading').innerText(), SLOW).toBe(heading);
  await context.close();
});

test('what is shown is saved as numbers, as a picture and as a drawing', async () => {
  const { page, context } = await open({ width: 1280, height: 1000 });
  await signIn(page, 'operator@merrow.example');
  await page.goto(`${STATIONS}/MER-02?${dayQuery(3)}`);
  await page.getByRole('application').waitFor();
  await expect.poll(() => page.getByText(/dB \(Z\) a band/).count(), SLOW).toBe(1);
  const save = async (kind: string) => {
    const download = page.waitForEvent('download');
    await page.getByRole('button', { name: `Save what is shown as ${kind}` }).click();
    const file = await download;
    expect(file.suggestedFilename()).toMatch(new RegExp(`^MER-02_.*\\.${kind.toLowerCase()}$`));
    return readFileSync(await file.path());
  };
  const { data } = Papa.parse<Record<string, string>>((await save('CSV')).toString('utf8'), {
    header: true,
    skipEmptyLines: true,
  });
  expect(data).toHaveLength(1440);
  const api = await signedInFetch('operator@merrow.example');
  const hour = `from=${dateDaysAgo(3)}T12:00:00Z&to=${dateDaysAgo(3)}T13:00:00Z`;
  const told = (await (
    await api('GET', `/api/v1/networks/merrow/stations/MER-02/spectrogram?${hour}&percentiles=A`)
  ).json()) as { LAeq: number[]; percentiles: { seconds: number; LA90: number[] } };
  const row = data.find(({ start_utc: start }) => start === `${dateDaysAgo(3)}T12:07:00Z`);
  expect(Number(row?.['LAeq_dB'])).toBeCloseTo(told.LAeq[7] ?? NaN, 0);
  expect([row?.['LAN_block_s'], Number(row?.['LA90_dB'])]).toEqual(['3600', told.percentiles.LA90[7]]);
  expect(told.percentiles.seconds).toBe(3600);

  expect((await save('PNG')).subarray(1, 4).toString('latin1')).toBe('PNG');
  const drawing = (await save('SVG')).toString('utf8');
  expect(drawing).toContain('<svg xmlns="http://www.w3.org/2000/svg"');
  expect(drawing).toContain('(MER-02)</text>');
  await context.close();
});
