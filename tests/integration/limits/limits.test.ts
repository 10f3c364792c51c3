import { beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { tellExceedances } from '#ingest/notify/tellExceedances';
import type { Limit, LimitDetail } from '#lib/contracts/limits';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { judged, send } from './support';

useFreshSchema();

const QUARTER_SEC = 900;
const NIGHT = {
  name: 'Night limit',
  metric: 'LAeq',
  window: '15min',
  threshold: 60,
  recipients: ['duty@limits.example'],
  reason: 'Permit, condition 4',
};
let networks = 0;
let networkId: number;
let stationId: number;
let base: string;
let operator: string;
let regulator: string;

beforeEach(async () => {
  networks += 1;
  networkId = await makeNetwork(`limits-${networks}`);
  stationId = await makeStation(networkId, 'LM-1');
  base = `/api/v1/networks/limits-${networks}/limits`;
  operator = (await makePerson(networkId, ['operator'])).session;
  regulator = (await makePerson(networkId, ['regulator'])).session;
});

async function post(path: string, body: unknown, session = operator): Promise<Response> {
  return callApi('POST', path, { session, body });
}

async function set(changes: Record<string, unknown> = {}): Promise<Limit> {
  const response = await post(base, { ...NIGHT, ...changes });
  const answer = (await response.json()) as { limit: Limit };
  expect(response.status, JSON.stringify(answer)).toBe(201);
  return answer.limit;
}

async function detail(id: number, session = operator): Promise<LimitDetail> {
  const response = await callApi('GET', `${base}/${id}`, { session });
  expect(response.status).toBe(200);
  return (await response.json()) as LimitDetail;
}

async function refusedFields(response: Response): Promise<string[]> {
  const { fields, status } = (await response.json()) as { status: number; fields?: { field: string }[] };
  expect(status).toBe(422);
  return (fields ?? []).map(({ field }) => field);
}

const utc = (sec: number) => new Date(sec * 1000).toISOString();
/** The quarter-hour that began this many quarter-hours ago. */
const quartersAgo = (count: number) =>
  Math.floor(Date.now() / 1000 / QUARTER_SEC) * QUARTER_SEC - count * QUARTER_SEC;

/** A quarter-hour of minutes at one level. */
async function measured(startSec: number, LAeq: number): Promise<void> {
  const minute = { LAeq, LAFmax: LAeq + 5, levels: [LAeq + 3, LAeq - 3] };
  await send(stationId, startSec, new Array<typeof minute>(15).fill(minute));
}

const judge = () => judged(tellExceedances);

const exceedances = () => db()('exceedances').where({ network_id: networkId }).orderBy('starts_at');

describe('setting a limit', () => {
  test('it holds from now on, with what was left out filled in', async () => {
    expect(await set()).toMatchObject({
      version: 1,
      state: 'in-force',
      descriptor: 'LAeq,15 min',
      weekdays: ['mon', 'tue', 'wed', 'thu', 'fri', 'sat', 'sun'],
      stations: null,
      minimumCoverage: null,
      effectiveTo: null,
      recipients: ['duty@limits.example'],
    });
  });

  test('recipients are shown to operators only, and not written to the audit trail', async () => {
    const { id } = await set();
    const seen = await detail(id, regulator);
    expect(seen.limit).not.toHaveProperty('recipients');
    expect(seen.versions[0]).not.toHaveProperty('recipients');
    const list = await callApi('GET', base, { session: regulator });
    expect(await list.text()).not.toContain('duty@');
    const audit = await db()('audit_log').where({ network_id: networkId });
    expect(JSON.stringify(audit)).toContain('limit.add');
    expect(JSON.stringify(audit)).not.toContain('duty@');
  });

  test('only operators set, change and withdraw', async () => {
    const { id } = await set();
    const liaison = (await makePerson(networkId, ['liaison'])).session;
    for (const session of [regulator, liaison]) {
      expect((await post(base, NIGHT, session)).status).toBe(403);
      expect((await post(`${base}/${id}/versions`, NIGHT, session)).status).toBe(403);
      expect((await post(`${base}/${id}/withdrawal`, { reason: 'No' }, session)).status).toBe(403);
    }
    expect((await detail(id)).versions).toHaveLength(1);
  });

  test('a limit of another network is not there', async () => {
    const { id } = await set();
    const elsewhere = await makeNetwork(`elsewhere-${networks}`);
    const other = (await makePerson(elsewhere, ['operator'])).session;
    const own = `/api/v1/networks/elsewhere-${networks}/limits/${id}`;
    expect((await callApi('GET', own, { session: other })).status).toBe(404);
    expect((await post(`${own}/versions`, NIGHT, other)).status).toBe(404);
    expect((await post(`${own}/withdrawal`, { reason: 'Mine now' }, other)).status).toBe(404);
    expect((await detail(id)).limit.state).toBe('in-force');
  });

  test.each([
    ['threshold', { threshold: 300 }],
    ['threshold', { threshold: 60.05 }],
    ['bandHz', { metric: 'bandLeq', bandFraction: 1, bandHz: 100 }],
    ['bandFraction', { metric: 'bandLeq', bandHz: 100 }],
    ['bandHz', { bandHz: 100, bandFraction: 3 }],
    ['from', { window: 'night', from: '22:00', to: '06:00' }],
    ['to', { from: '22:00' }],
    ['weekdays', { weekdays: [] }],
    ['stations', { stations: ['LM-1', 'XX-9'] }],
    ['stations', { metric: 'bandLeq', bandFraction: 3, bandHz: 16000, stations: ['LM-1'] }],
    ['recipients.0', { recipients: ['nobody'] }],
    ['minimumCoverage', { minimumCoverage: 75 }],
    ['effectiveFrom', { effectiveFrom: '2020-01-01T00:00:00Z' }],
  ])('what does not fit is refused by its field: %s of %o', async (field, changes) => {
    expect(await refusedFields(await post(base, { ...NIGHT, ...changes }))).toContain(field);
    expect(await db()('limits').where({ network_id: networkId })).toEqual([]);
  });

  test('an evening limit needs a network with evenings', async () => {
    const slug = `no-evening-${networks}`;
    const scheme = { dayStartMin: 420, eveningStartMin: null, nightStartMin: 1320 };
    const id = await makeNetwork(slug, { scheme });
    const session = (await makePerson(id, ['operator'])).session;
    const response = await post(`/api/v1/networks/${slug}/limits`, { ...NIGHT, window: 'evening' }, session);
    expect(await refusedFields(response)).toEqual(['window']);
  });
});

describe('judging the past', () => {
  test('a limit that begins in the past finds what exceeded it since, not before', async () => {
    for (const [ago, level] of [
      [12, 70],
      [8, 70],
      [7, 50],
    ] as const) {
      await measured(quartersAgo(ago), level);
    }
    await judge();
    const { id } = await set({ effectiveFrom: utc(quartersAgo(10)) });
    const pending = await db()('pending_windows').where({ limit_id: id }).orderBy('starts_at');
    expect(pending.map(({ starts_at }) => starts_at)).toEqual([quartersAgo(8), quartersAgo(7)]);
    await judge();
    expect((await exceedances()).map(({ starts_at }) => starts_at)).toEqual([quartersAgo(8)]);
  });

  test('no e-mail goes out for windows that ended more than 48 hours ago', async () => {
    await measured(quartersAgo(3 * 96), 70);
    await measured(quartersAgo(8), 71);
    await judge();
    await set({ effectiveFrom: utc(quartersAgo(4 * 96)) });
    await judge();
    expect(await exceedances()).toHaveLength(2);
    const mails = await db()('outbox').where({ network_id: networkId });
    expect(mails).toHaveLength(1);
    expect(mails[0].text_body).toContain('71.0 dB');
    expect(mails[0].text_body).not.toContain('70.0 dB');
  });

  test('a new version from now on leaves past exceedances; one from before them judges them anew', async () => {
    await measured(quartersAgo(8), 62);
    await measured(quartersAgo(4), 68);
    await judge();
    const { id } = await set({ effectiveFrom: utc(quartersAgo(10)) });
    await judge();
    expect(await exceedances()).toHaveLength(2);

    const versions = `${base}/${id}/versions`;
    expect((await post(versions, { ...NIGHT, threshold: 65, reason: 'Raised' })).status).toBe(201);
    await judge();
    expect((await exceedances()).map(({ state }) => state)).toEqual(['standing', 'standing']);

    const since = { effectiveFrom: utc(quartersAgo(10)), reason: 'Raised from the beginning' };
    expect((await post(versions, { ...NIGHT, threshold: 65, ...since })).status).toBe(201);
    await judge();
    expect(await exceedances()).toMatchObject([
      { starts_at: quartersAgo(8), state: 'lifted' },
      { starts_at: quartersAgo(4), state: 'standing', threshold_tenths: 650 },
    ]);
    const told = await detail(id);
    expect(told.versions.map(({ threshold, reason }) => [threshold, reason])).toEqual([
      [60, NIGHT.reason],
      [65, 'Raised'],
      [65, 'Raised from the beginning'],
    ]);
    expect(told.limit).toMatchObject({ version: 3, threshold: 65 });
  });

  test('chosen stations only', async () => {
    await makeStation(networkId, 'LM-2');
    await measured(quartersAgo(8), 70);
    await judge();
    await set({ stations: ['LM-2'], effectiveFrom: utc(quartersAgo(10)) });
    await judge();
    expect(await exceedances()).toEqual([]);
  });
});

describe('changing and withdrawing', () => {
  test('a change needs a reason; one that is to come is told', async () => {
    const { id } = await set();
    expect(await refusedFields(await post(`${base}/${id}/versions`, { ...NIGHT, reason: ' ' }))).toEqual([
      'reason',
    ]);
    const effectiveFrom = utc(quartersAgo(-96));
    await post(`${base}/${id}/versions`, { ...NIGHT, threshold: 55, reason: 'Stricter', effectiveFrom });
    expect((await detail(id)).limit).toMatchObject({
      version: 1,
      threshold: 60,
      state: 'in-force',
      nextVersionFrom: effectiveFrom.replace('.000Z', 'Z'),
    });
  });

  test('withdrawn once, with who and why; afterwards it cannot be changed', async () => {
    const { id } = await set();
    expect(await refusedFields(await post(`${base}/${id}/withdrawal`, {}))).toEqual(['reason']);
    const withdrawn = await post(`${base}/${id}/withdrawal`, { reason: 'Permit ended' });
    expect(await withdrawn.json()).toMatchObject({
      limit: { state: 'withdrawn', withdrawal: { reason: 'Permit ended', by: expect.any(String) } },
    });
    expect((await post(`${base}/${id}/withdrawal`, { reason: 'Again' })).status).toBe(409);
    expect((await post(`${base}/${id}/versions`, { ...NIGHT, reason: 'Late' })).status).toBe(409);
    const { limit, versions } = await detail(id);
    expect(limit.withdrawal?.reason).toBe('Permit ended');
    expect(versions).toHaveLength(1);
    const actions = await db()('audit_log').where({ network_id: networkId }).orderBy('id').pluck('action');
    expect(actions).toEqual(['limit.add', 'limit.withdraw']);
  });
});
