import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parse } from 'csv-parse/sync';
import { unzipSync } from 'fflate';
import { beforeAll, describe, expect, test, vi } from 'vitest';
import { db } from '#db/client';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { monthDocumentSchema, type MonthDocument } from '#lib/contracts/monthDocument';
import { type SummaryMonth } from '#lib/contracts/summaries';
import { SUMMARY_METRICS } from '#lib/contracts/summaryTemplate';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { at, storeMinutes } from '../complaints/support';

useFreshSchema();
vi.setConfig({ testTimeout: 240_000 });

const SUMMARIES = '/api/v1/networks/merrow/summaries';
let regulator: string;
let stationId: number;

/** Levels of the test month: 60 dB by day, 55 in the evening, 50 at night; one night is missing, one day is half there. */
function levelAt(startSec: number): number | null {
  const date = new Date(startSec * 1000);
  const hour = date.getUTCHours();
  const day = date.getUTCDate();
  if (hour >= 7 && hour < 19) return day === 9 && hour >= 13 ? null : 6000;
  if (hour >= 19 && hour < 23) return 5500;
  const nightOf = hour < 7 ? new Date(date.getTime() - 86_400_000) : date;
  return nightOf.getUTCDate() === 15 && nightOf.getUTCMonth() === 1 ? null : 5000;
}

beforeAll(async () => {
  const networkId = await makeNetwork('merrow');
  await makeNetwork('farther');
  stationId = await makeStation(networkId, 'MER-01', { name: 'Quay Head', intervalSec: 60 });
  await makeStation(networkId, 'MER-02', { name: 'Silo Lane' });
  await db()('stations').update({ created_at: new Date('2026-01-01T00:00:00Z') });
  regulator = (await makePerson(networkId, ['regulator'])).session;
  await storeMinutes(stationId, at('2026-02-01T00:00:00Z'), at('2026-03-01T07:00:00Z'), (startSec) => {
    const laeqCentiDb = levelAt(startSec);
    if (laeqCentiDb === null) return null;
    // One passing siren: the month's maximum.
    return startSec === at('2026-02-20T12:34:00Z') ? { laeqCentiDb: 8000 } : { laeqCentiDb };
  });
  await aggregateAll(async () => {});
  await db()('limits').insert({ id: 1, network_id: networkId, created_at: new Date() });
  await db()('limit_versions').insert({
    id: 1,
    limit_id: 1,
    version: 1,
    effective_from: 0,
    name: 'Day hours',
    metric: 'LAFmax',
    averaging: '15min',
    threshold_tenths: 850,
    recipients: '[]',
    created_at: new Date(),
  });
  const exceedance = (start: string, state: 'standing' | 'lifted') => ({
    network_id: networkId,
    station_id: stationId,
    limit_id: 1,
    limit_version_id: 1,
    starts_at: at(start),
    ends_at: at(start) + 900,
    level_db: 89,
    threshold_tenths: 850,
    coverage: 1,
    state,
    detected_at: new Date(),
  });
  await db()('exceedances').insert([
    exceedance('2026-02-20T12:30:00Z', 'standing'),
    exceedance('2026-02-21T12:30:00Z', 'lifted'),
    exceedance('2026-03-01T00:00:00Z', 'standing'),
  ]);
});

const fetchFile = (file: string, session = regulator) => callApi('GET', `${SUMMARIES}/${file}`, { session });
const february = async () =>
  (await (await fetchFile('2026-02.json')).json()) as MonthDocument & { status: 'draft' };

describe('the figures of a month', () => {
  test('are of the contract’s form and those that the levels give', async () => {
    const summary = await february();
    const { status, ...document } = summary;
    expect(status).toBe('draft');
    expect(monthDocumentSchema.parse(document)).toEqual(document);
    expect(summary).toMatchObject({
      month: '2026-02',
      status: 'draft',
      isToDate: false,
      timeZone: 'Europe/London',
      from: '2026-02-01T00:00:00Z',
      to: '2026-03-01T00:00:00Z',
      complaints: { open: 0, answered: 0, closed: 0 },
    });
    const [quay, silo] = summary.stations;
    expect(silo).toMatchObject({
      code: 'MER-02',
      figures: { LAeq: null, Lden: null, coverage: 0, meetsMinimum: false },
    });

    // One minute of 80 dB among the month's valid day minutes of 60 dB: 28 days of 12 h, less 6 h.
    const dayMinutes = 28 * 720 - 360;
    const Lday = 10 * Math.log10((10 ** 8 + (dayMinutes - 1) * 10 ** 6) / dayMinutes);
    const Lden = 10 * Math.log10((12 * 10 ** (Lday / 10) + 4 * 10 ** 6 + 8 * 10 ** 6) / 24);
    expect(quay?.figures.Lday).toBeCloseTo(Lday, 6);
    expect(quay?.figures.Levening).toBeCloseTo(55, 6);
    expect(quay?.figures.Lnight).toBeCloseTo(50, 6);
    expect(quay?.figures.Lden).toBeCloseTo(Lden, 6);
    expect(quay?.figures).toMatchObject({
      LA10: 60,
      LA90: 50,
      LAFmax: 89,
      LAFmaxAt: '2026-02-20T12:34:00Z',
      sampleSeconds: 60,
      meetsMinimum: true,
    });
    expect(quay?.figures.periods.night.coverage).toBeCloseTo(27 / 28, 9);
    expect(quay?.figures.periods.day.coverage).toBeCloseTo((28 * 12 - 6) / (28 * 12), 9);
    expect(quay?.figures.coverage).toBeCloseTo((28 * 24 - 8 - 6) / (28 * 24), 9);
    expect(quay?.bands.find(({ nominalHz }) => nominalHz === 1000)).toMatchObject({
      nominalHz: 1000,
      Leq: expect.closeTo(40, 6),
      L10: 40,
      L50: 40,
      L90: 40,
    });
  });

  test('day by day: the night goes by the date on which it begins, a missing one takes the Lden with it', async () => {
    const days = (await february()).stations[0]?.days ?? [];
    expect(days).toHaveLength(28);
    const of = (date: string) => days.find((day) => day.date === date);
    expect(of('2026-02-15')).toMatchObject({ Lnight: null, Lden: null });
    expect(of('2026-02-16')?.Lnight).toBeCloseTo(50, 6);
    expect(of('2026-02-28')?.periods.night).toEqual({ coverage: 1, meetsMinimum: true });
    expect(of('2026-02-09')).toMatchObject({ Lday: expect.closeTo(60, 6) });
    expect(of('2026-02-09')?.periods.day).toEqual({ coverage: 0.5, meetsMinimum: false });
    expect(of('2026-02-09')?.periods.whole.meetsMinimum).toBe(false);
  });

  test('exceedances are those whose window begins in the month, standing and lifted counted apart', async () => {
    const exceedances = (await february()).stations[0]?.exceedances;
    expect(exceedances).toMatchObject({ standing: 1, lifted: 1 });
    expect(exceedances?.items.map(({ from, metric, state }) => [from, metric, state])).toEqual([
      ['2026-02-20T12:30:00Z', 'LAFmax within 15 min', 'standing'],
      ['2026-02-21T12:30:00Z', 'LAFmax within 15 min', 'lifted'],
    ]);
  });

  test('JSON, CSV and PDF carry the same figures', async () => {
    const [{ figures, days } = await Promise.reject(new Error('no station'))] = (await february()).stations;
    const csv = await fetchFile('2026-02.csv');
    expect(csv.headers.get('content-type')).toBe('application/zip');
    expect(csv.headers.get('bittern-revision')).toBe('draft');
    const files = unzipSync(new Uint8Array(await csv.arrayBuffer()));
    const table = (name: string): Record<string, string>[] =>
      parse(Buffer.from(files[`${name}.csv`] ?? []).toString('utf8'), { columns: true });
    const [ofMonth, ofDays] = [table('month'), table('days')];
    const pdf = await fetchFile('2026-02.pdf');
    expect(pdf.headers.get('content-type')).toBe('application/pdf');
    const text = pdfText(Buffer.from(await pdf.arrayBuffer()));
    const line = (start: string) => text.split('\n').filter((found) => found.trim().startsWith(start));

    const names = ['Lday', 'Levening', 'Lnight', 'Lden', 'LAeq', 'LAFmax'] as const;
    for (const name of names) {
      const row = ofMonth.find((found) => found['station'] === 'MER-01' && found['quantity'] === name);
      expect(Number(row?.['level_db'])).toBe(figures[name]);
    }
    const shown = (level: number | null) => (level === null ? '—' : roundHalfUp(level, 1).toFixed(1));
    expect(
      line('MER-01 Quay Head')[0]
        ?.split(/\s{2,}/)
        .slice(1, 1 + SUMMARY_METRICS.length),
    ).toEqual(SUMMARY_METRICS.map((name) => shown(figures[name])));
    for (const day of days) {
      const row = ofDays.find((found) => found['station'] === 'MER-01' && found['date'] === day.date);
      expect(row?.['Lden_db']).toBe(day.Lden === null ? '' : String(day.Lden));
      expect(
        line(day.date)
          .find((found) => !found.includes('Day hours'))
          ?.replaceAll('† ', '')
          .trim()
          .split(/\s{2,}/)
          .slice(1, 5),
        day.date,
      ).toEqual([day.Lday, day.Levening, day.Lnight, day.Lden].map(shown));
    }
  });
});

describe('the list of months', () => {
  test('has the months with data, latest first, with each station’s coverage', async () => {
    const list = async (query = '') =>
      (await (await callApi('GET', SUMMARIES + query, { session: regulator })).json()) as {
        items: SummaryMonth[];
        next: string | null;
      };
    const { items } = await list();
    expect(items.map(({ month }) => month)).toEqual(['2026-02', '2026-01']);
    const coverage = items[0]?.stations.map(({ coverage: share }) => share) ?? [];
    const summary = await february();
    expect(coverage[0]).toBeCloseTo(summary.stations[0]?.figures.periods.whole.coverage ?? NaN, 9);
    expect(coverage[1]).toBe(0);
    const first = await list('?limit=1');
    expect(first.items.map(({ month }) => month)).toEqual(['2026-02']);
    const second = await list(`?limit=1&cursor=${first.next}`);
    expect(second).toMatchObject({ items: [{ month: '2026-01' }], next: null });
    const within = await list('?from=2026-02-10T00:00:00Z&to=2026-02-11T00:00:00Z');
    expect(within.items.map(({ month }) => month)).toEqual(['2026-02']);
  });
});

test('a month in progress is to date: its coverage is of what has elapsed', async () => {
  const now = new Date();
  const month = now.toISOString().slice(0, 7);
  const summary = (await (await fetchFile(`${month}.json`)).json()) as MonthDocument;
  expect(summary).toMatchObject({ month, isToDate: true });
});

test.each([
  ['2026-13.pdf', 404],
  ['2026-02.docx', 404],
  ['2026-02', 404],
  ['2199-01.pdf', 404],
  ['2026-02.pdf?revision=1', 404],
])('%s is refused', async (file, status) => {
  const answer = await fetchFile(file);
  expect(answer.status).toBe(status);
  expect(answer.headers.get('content-type')).toBe('application/problem+json');
});

test('who may read: every role of the network and the administrator, nobody else', async () => {
  const networkId = Number((await db()('networks').where({ slug: 'merrow' }).first('id')).id);
  const elsewhere = Number((await db()('networks').where({ slug: 'farther' }).first('id')).id);
  const readers = [
    [(await makePerson(networkId, ['operator'])).session, 200],
    [(await makePerson(networkId, ['liaison'])).session, 200],
    [(await makePerson(null, [], true)).session, 200],
    [(await makePerson(elsewhere, ['operator', 'regulator'])).session, 404],
    [undefined, 401],
  ] as const;
  for (const [session, status] of readers) {
    const files = status === 200 ? ['/2026-02.json'] : ['/2026-02.json', '/2026-02.csv', '/2026-02.pdf'];
    for (const path of ['', ...files]) {
      const answer = await callApi('GET', SUMMARIES + path, session === undefined ? {} : { session });
      expect(answer.status, path).toBe(status);
    }
  }
});

function pdfText(bytes: Buffer): string {
  const directory = mkdtempSync(join(tmpdir(), 'bittern-summary-'));
  const file = join(directory, 'summary.pdf');
  writeFileSync(file, bytes);
  const text = execFileSync('pdftotext', ['-layout', file, '-'], { encoding: 'utf8' });
  rmSync(directory, { recursive: true });
  return text;
}
