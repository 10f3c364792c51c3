import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { type Exclusion, type ExclusionPreview } from '#lib/contracts/exclusions';
import { type Days } from '#lib/contracts/levels';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { makeDesk, sec, type Desk } from '../levels/support/desk';
import { invent, storeMeasured } from '../levels/support/measured';

/** Exclusions of several stations by one act: their preview, and their withdrawal. Over the clock change of 29 March 2026. */
useFreshSchema();

const CODES = ['STORM-1', 'STORM-2', 'STORM-3'];
const base = '/api/v1/networks/storms/exclusions';
const STORM = { from: '2026-03-28T22:17:31Z', to: '2026-03-29T04:40:10Z' };
let desk: Desk;
let operator: { session: string };
let regulator: { session: string };

beforeAll(async () => {
  desk = await makeDesk('storms');
  operator = await makePerson(desk.networkId, ['operator']);
  regulator = await makePerson(desk.networkId, ['regulator']);
  const stretch = { fromSec: sec('2026-03-26T00:00:00Z'), toSec: sec('2026-04-01T00:00:00Z') };
  // A minute, five minutes and a whole hour: of the last, what straddles the ends reaches far out.
  for (const [at, intervalSec] of [60, 300, 3600].entries()) {
    const stationId = await makeStation(desk.networkId, CODES[at] ?? '', { intervalSec });
    await storeMeasured(
      stationId,
      await invent({ ...stretch, intervalSec, bands: [-16, 9], gaps: 0 }, 31 + at),
    );
  }
  await aggregateAll(async () => undefined);
}, 60_000);

async function ask<T>(path: string, body: Record<string, unknown>, status: number): Promise<T> {
  const response = await callApi('POST', `${base}${path}`, { ...operator, body });
  expect(response.status, await response.clone().text()).toBe(status);
  return (await response.json()) as T;
}

const preview = (body: Record<string, unknown>) => ask<ExclusionPreview>('/preview', body, 200);

function daysOf(code: string): Promise<Days> {
  return desk.read<Days>(code, 'days', { from: '2026-03-26', to: '2026-04-01' });
}

/** Expects a preview's figures to be those that `…/days` gives, before or after. */
async function expectFigures({ stations }: ExclusionPreview, when: 'before' | 'after'): Promise<void> {
  for (const { station, dates } of stations) {
    const { days } = await daysOf(station);
    for (const previewed of dates) {
      const day = days.find(({ date }) => date === previewed.date);
      const figures = previewed[when];
      for (const name of ['LAeq24h', 'Lday', 'Levening', 'Lnight', 'Lden'] as const) {
        const [expected, given] = [day?.[name] ?? null, figures[name]];
        if (expected === null) expect(given, `${station} ${previewed.date} ${name}`).toBeNull();
        else expect(given, `${station} ${previewed.date} ${name}`).toBeCloseTo(expected, 8);
      }
      expect(figures.coverage).toBeCloseTo(day?.coverage ?? -1, 10);
      expect(figures.validSeconds).toBe(day?.seconds.valid);
    }
  }
}

describe('a preview', () => {
  test('shows what the recomputation then gives, and what an undone act leaves', async () => {
    const asked = { stations: null, ...STORM };
    const previewed = await preview(asked);
    expect(previewed.stations.map(({ station }) => station)).toEqual(CODES);
    expect(previewed.stations.map(({ dates }) => dates.map(({ date }) => date))).toEqual(
      CODES.map(() => ['2026-03-28', '2026-03-29']),
    );
    await expectFigures(previewed, 'before');
    for (const { dates } of previewed.stations) {
      for (const { before, after } of dates) expect(after.coverage).toBeLessThan(before.coverage);
    }
    const { items } = await ask<{ items: Exclusion[] }>('/bulk', { ...asked, reason: 'Storm' }, 201);
    await expectFigures(previewed, 'after');
    await aggregateAll(async () => undefined);
    await expectFigures(previewed, 'after');
    // The same once more changes nothing any more.
    const again = await preview(asked);
    for (const { dates } of again.stations) {
      for (const { before, after } of dates) expect(after).toEqual(before);
    }
    await ask(`/acts/${items[0]?.act}/withdrawal`, { reason: 'It was the day before' }, 200);
    await expectFigures(previewed, 'before');
    await aggregateAll(async () => undefined);
    await expectFigures(previewed, 'before');
  });

  test('counts what waits for recomputation, and stores nothing', async () => {
    const { networkId } = desk;
    const stationId = await makeStation(networkId, 'STORM-9');
    const stretch = { fromSec: sec('2026-03-28T00:00:00Z'), toSec: sec('2026-03-30T00:00:00Z') };
    await storeMeasured(stationId, await invent({ ...stretch, intervalSec: 60, bands: [-16, 9] }, 5));
    const previewed = await preview({ stations: ['STORM-9'], ...STORM });
    await expectFigures(previewed, 'before');
    expect(await db()('exclusions').where({ station_id: stationId })).toEqual([]);
    await ask('/bulk', { stations: ['STORM-9'], ...STORM, reason: 'Storm' }, 201);
    await expectFigures(previewed, 'after');
  });

  test('of a long period shows a month of dates and says how many it does not', async () => {
    const { stations } = await preview({
      stations: ['STORM-1'],
      from: '2026-03-01T12:00:00Z',
      to: '2026-05-01T12:00:00Z',
    });
    expect(stations[0]?.dates).toHaveLength(31);
    expect(stations[0]?.omittedDates).toBe(62 - 31);
  });
});

describe('an act', () => {
  test('makes one exclusion a station, and is undone one by one or whole, each once', async () => {
    const asked = { stations: ['STORM-2', 'STORM-1'], ...STORM, reason: 'Storm: gusts' };
    const { items } = await ask<{ items: Exclusion[] }>('/bulk', asked, 201);
    const act = items[0]?.act;
    expect(items.map(({ station, reason }) => [station, reason])).toEqual([
      ['STORM-1', 'Storm: gusts'],
      ['STORM-2', 'Storm: gusts'],
    ]);
    expect(new Set(items.map((item) => item.act))).toEqual(new Set([items[0]?.id]));
    const [entry] = await db()('audit_log').where({ action: 'exclusion.act' }).orderBy('id', 'desc');
    expect(entry.detail).toMatchObject({ act, stations: ['STORM-1', 'STORM-2'], reason: 'Storm: gusts' });
    await ask(`/${items[0]?.id}/withdrawal`, { reason: 'Sheltered there' }, 200);
    const whole = `/acts/${act}/withdrawal`;
    const withdrawn = await ask<{ items: Exclusion[] }>(whole, { reason: 'No storm' }, 200);
    expect(withdrawn.items).toMatchObject([{ station: 'STORM-2', withdrawal: { reason: 'No storm' } }]);
    await ask(whole, { reason: 'again' }, 409);
    const csv = await (await callApi('GET', `${base}.csv?station=STORM-1`, regulator)).text();
    expect(csv).toContain(`${act},STORM-1,${STORM.from},${STORM.to},Storm: gusts`);
    expect(csv).toContain('Sheltered there');
    expect(csv).not.toContain('STORM-2');
  });

  test('with a station that is not there, or a period that is none, changes nothing', async () => {
    const count = async () => Number((await db()('exclusions').count({ n: '*' }).first())?.['n']);
    const before = await count();
    const wrong: Record<string, unknown>[] = [
      { stations: ['STORM-1', 'NONE'], ...STORM },
      { stations: [], ...STORM },
      { stations: null, from: STORM.to, to: STORM.from },
      { stations: null, from: '2020-01-01T00:00:00Z', to: '2026-01-01T00:00:00Z' },
    ];
    for (const body of wrong) {
      await ask('/preview', body, 422);
      await ask('/bulk', { ...body, reason: 'x' }, 422);
    }
    expect(await count()).toBe(before);
  });

  test('is for operators of the network alone', async () => {
    const foreign = await makePerson(await makeNetwork('calm'), ['operator']);
    const paths = ['/preview', '/bulk', '/acts/1/withdrawal'];
    for (const path of paths) {
      const body = { stations: null, ...STORM, reason: 'Storm' };
      expect((await callApi('POST', `${base}${path}`, { ...regulator, body })).status, path).toBe(403);
      expect((await callApi('POST', `${base}${path}`, { ...foreign, body })).status, path).toBe(404);
    }
    const { items } = await ask<{ items: Exclusion[] }>(
      '/bulk',
      { stations: null, ...STORM, reason: 'x' },
      201,
    );
    const path = `/api/v1/networks/calm/exclusions/acts/${items[0]?.act}/withdrawal`;
    expect((await callApi('POST', path, { ...foreign, body: { reason: 'x' } })).status).toBe(404);
    const list = await callApi('GET', `${base}?station=STORM-1`, regulator);
    expect((await list.json()).items[0].withdrawal).toBeNull();
  });
});
