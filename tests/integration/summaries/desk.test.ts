import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { db } from '#db/client';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { DEFAULT_SUMMARY_TEMPLATE, type SummaryTemplate } from '#lib/contracts/summaryTemplate';
import { deskOf } from '#lib/services/summaries/desk/desk';
import { visit } from '#lib/services/summaries/desk/readers';
import { previewPdf } from '#lib/services/summaries/template/preview';
import {
  changeSummarySettings,
  readMark,
  restoreSummarySettings,
  summarySettings,
} from '#lib/services/summaries/template/settings';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { issue, MONTH, must, network, storeMarch } from './lifeSupport';

const dataDir = mkdtempSync(join(tmpdir(), 'bittern-desk-'));
process.env['BITTERN_DATA_DIR'] = dataDir;
useFreshSchema();
vi.setConfig({ testTimeout: 240_000 });

/** A PNG of one dot. */
const DOT = Buffer.from(
  'iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg==',
  'base64',
);

let operator: { userId: string; session: string };
let regulator: { userId: string; session: string };
let liaison: { userId: string; session: string };
let networkId: number;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  const quay = await makeStation(networkId, 'MER-01');
  await db()('stations').update({ created_at: new Date('2026-01-01T00:00:00Z') });
  operator = await makePerson(networkId, ['operator']);
  regulator = await makePerson(networkId, ['regulator']);
  liaison = await makePerson(networkId, ['liaison']);
  await storeMarch(quay, 5200);
  await aggregateAll(async () => {});
}, 240_000);

afterAll(() => {
  rmSync(dataDir, { recursive: true, force: true });
});

const template = (changes: Partial<SummaryTemplate>) => ({ ...DEFAULT_SUMMARY_TEMPLATE, ...changes });

describe('how months are made', () => {
  const act = () => ({ networkId, userId: operator.userId });

  test('what is set is a new version; an earlier one can hold again', async () => {
    expect((await summarySettings(networkId)).version).toBe(0);
    const first = { graceDays: 3, template: template({ introduction: 'Around the quay.' }) };
    must(await changeSummarySettings(act(), first, DOT));
    must(await changeSummarySettings(act(), { ...first, graceDays: 9 }, null));
    expect(await summarySettings(networkId)).toMatchObject({ version: 2, graceDays: 9, mark: null });
    must(await restoreSummarySettings(act(), 1));
    const now = await summarySettings(networkId);
    expect(now).toMatchObject({ version: 3, graceDays: 3, template: first.template });
    expect((await readMark(now.mark))?.mediaType).toBe('image/png');
    expect((await restoreSummarySettings(act(), 7)).kind).toBe('unknown');
  });

  test.each([
    ['an SVG drawing', '<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>'],
    ['text that calls itself a PNG', '\u0089PNG'],
    ['half a PNG', DOT.subarray(0, 40)],
  ])('%s is no mark', async (_, content) => {
    const settings = { graceDays: 3, template: DEFAULT_SUMMARY_TEMPLATE };
    const outcome = await changeSummarySettings(act(), settings, new Uint8Array(Buffer.from(content)));
    expect(outcome).toMatchObject({ kind: 'invalid', problems: [{ field: 'mark' }] });
  });

  test('the interface takes them from operators only', async () => {
    const path = '/api/v1/networks/merrow/summary-settings';
    const body = { graceDays: 4, template: template({ networkName: 'The quay' }) };
    expect((await callApi('PUT', path, { session: regulator.session, body })).status).toBe(403);
    const put = await callApi('PUT', path, { session: operator.session, body });
    expect(await put.json()).toMatchObject({ graceDays: 4, hasMark: true });
    const wrong = await callApi('PUT', path, { session: operator.session, body: { ...body, graceDays: 99 } });
    expect(wrong.status).toBe(422);
  });

  test('the preview is a PDF of what is not saved yet', async () => {
    const settings = { graceDays: 3, template: template({ sections: ['days'], metrics: ['Lden'] }) };
    const pdf = await previewPdf(await network(), settings, null, new Date());
    expect(Buffer.from(pdf.subarray(0, 5)).toString()).toBe('%PDF-');
    expect((await summarySettings(networkId)).template.metrics.length).toBeGreaterThan(1);
  });
});

describe('who looks and who is told', () => {
  const preferences = (session: string, isTold?: boolean) =>
    callApi(isTold === undefined ? 'GET' : 'PUT', '/api/v1/networks/merrow/summary-preferences', {
      session,
      ...(isTold === undefined ? {} : { body: { isTold } }),
    });

  test('regulators are told unless they say otherwise, others where they ask', async () => {
    expect(await (await preferences(regulator.session)).json()).toEqual({ isTold: true });
    expect(await (await preferences(liaison.session)).json()).toEqual({ isTold: false });
    await preferences(liaison.session, true);
    await preferences(regulator.session, false);
    expect(await issue(operator.userId)).toBe(1);
    const told: string[] = await db()('outbox').where({ kind: 'summary' }).pluck('recipient');
    expect(told).toEqual([(await db()('users').where({ id: liaison.userId }).first('email')).email]);
  });

  test('what was issued since the last visit is new, for half an hour of looking around', async () => {
    const reader = { networkId, userId: regulator.userId };
    const fresh = async () => {
      const [desk] = await deskOf([await network()], regulator.userId, new Date());
      return [...(desk?.fresh ?? [])];
    };
    const start = Date.now();
    const after = (minutes: number) => new Date(start + minutes * 60_000);
    expect(await visit(reader, after(-120))).toBeNull();
    expect(await fresh()).toEqual([MONTH]);
    expect((await visit(reader, after(0)))?.map(({ month }) => month)).toEqual([MONTH]);
    expect((await visit(reader, after(10)))?.map(({ month }) => month)).toEqual([MONTH]);
    expect(await visit(reader, after(50))).toEqual([]);
    expect(await fresh()).toEqual([]);
  });

  test('nothing but issued months goes into an archive', async () => {
    const ask = (query: string) =>
      callApi('GET', `/api/v1/networks/merrow/summaries/archive.zip?${query}`, {
        session: regulator.session,
      });
    expect((await ask('month=2026-01')).status).toBe(404);
    expect((await ask('')).status).toBe(400);
    expect((await ask(`month=${MONTH}&format=exe`)).status).toBe(400);
    expect((await ask(`month=${MONTH}&month=2026-01`)).status).toBe(200);
  });
});
