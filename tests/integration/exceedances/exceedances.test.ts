import { parse } from 'csv-parse/sync';
import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import type { Exceedance, ExceedanceDetail } from '#lib/contracts/exceedances';
import { at, storeMinutes } from '../complaints/support';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { lift, mailAbout, makeExceedance, makeLimit, RECIPIENT } from './support';

useFreshSchema();

const LIST = '/api/v1/networks/merrow/exceedances';
const NIGHT = at('2026-03-17T03:00:00Z');
const sessions: Record<string, string> = {};
const userIds: Record<string, string> = {};
const stationIds: Record<string, number> = {};
let networkId: number;
let limitId: number;
let loudId: number;
let liftedId: number;
let elsewhereId: number;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  const elsewhere = await makeNetwork('farther');
  stationIds['MER-01'] = await makeStation(networkId, 'MER-01');
  stationIds['MER-02'] = await makeStation(networkId, 'MER-02', { latitude: 54.11 });
  const limit = await makeLimit(networkId, '=Night, "quay"');
  limitId = limit.limitId;
  for (const role of ['operator', 'liaison', 'regulator'] as const) {
    const person = await makePerson(networkId, [role]);
    sessions[role] = person.session;
    userIds[role] = person.userId;
  }
  sessions['administrator'] = (await makePerson(null, [], true)).session;
  sessions['stranger'] = (await makePerson(elsewhere, ['operator', 'liaison', 'regulator'])).session;

  const minute = (laeqCentiDb: number) => () => ({
    laeqCentiDb,
    bandCentiDb: (index: number) => (index === -10 ? laeqCentiDb + 500 : 4000),
    flags: 1 << 4,
  });
  await storeMinutes(stationIds['MER-01'] ?? 0, NIGHT, NIGHT + 3600, minute(5740));
  await storeMinutes(stationIds['MER-02'] ?? 0, NIGHT, NIGHT + 3600, minute(4100));
  for (const week of [1, 2, 3, 4]) {
    const start = NIGHT - week * 7 * 86_400;
    await storeMinutes(stationIds['MER-01'] ?? 0, start, start + 3600, minute(4000 + week * 100));
  }
  const shared = { networkId, stationId: stationIds['MER-01'] ?? 0, limit };
  loudId = await makeExceedance({ ...shared, startSec: NIGHT, levelDb: 57.4049 });
  liftedId = await makeExceedance({ ...shared, startSec: NIGHT + 3600, levelDb: 55.1 });
  await lift(liftedId, { levelDb: 54.2, coverage: 0.9 });
  const stationId = stationIds['MER-02'] ?? 0;
  await makeExceedance({ ...shared, stationId, startSec: NIGHT + 7200, levelDb: 60 });
  await mailAbout(networkId, loudId);
  elsewhereId = await makeExceedance({
    networkId: elsewhere,
    stationId: await makeStation(elsewhere, 'FAR-01'),
    limit: await makeLimit(elsewhere, 'Foreign'),
    startSec: NIGHT,
    levelDb: 70,
  });
});

const call = (path: string, who = 'regulator') =>
  callApi('GET', `${LIST}${path}`, { session: sessions[who] });
const items = async (query: string) =>
  ((await (await call(query)).json()) as { items: Exceedance[] }).items.map(({ id }) => id);
const detail = async (id: number, who = 'regulator') =>
  ((await (await call(`/${id}`, who)).json()) as { exceedance: ExceedanceDetail }).exceedance;
const acknowledge = (id: number, body: Record<string, unknown>, who = 'operator') =>
  callApi('POST', `${LIST}/${id}/acknowledgement`, { session: sessions[who], body });

describe('who may do what', () => {
  test.each([
    ['operator', 200, 200],
    ['administrator', 200, 200],
    ['liaison', 200, 403],
    ['regulator', 200, 403],
    ['stranger', 404, 404],
    ['nobody', 401, 401],
  ])('%s', async (who, mayRead, mayAcknowledge) => {
    for (const path of ['', '.csv', `/${loudId}`]) {
      const answer = await call(path, who);
      expect(answer.status, path).toBe(mayRead);
      const seesRecipients = (who === 'operator' || who === 'administrator') && path.startsWith('/');
      expect((await answer.text()).includes(RECIPIENT), path).toBe(seesRecipients);
    }
    expect((await acknowledge(loudId, { note: 'Seen.' }, who)).status).toBe(mayAcknowledge);
  });

  test('a number of another network is nothing here, to read or to acknowledge', async () => {
    expect((await call(`/${elsewhereId}`, 'operator')).status).toBe(404);
    expect((await acknowledge(elsewhereId, { note: 'Seen.' })).status).toBe(404);
    const row = await db()('exceedances').where({ id: elsewhereId }).first('acknowledged_at');
    expect(row.acknowledged_at).toBeNull();
  });
});

describe('the list', () => {
  test('goes latest first, filters and pages', async () => {
    const all = await items('');
    expect(all).toHaveLength(3);
    expect(all.at(-1)).toBe(loudId);
    expect(await items('?station=MER-01')).toEqual([liftedId, loudId]);
    expect(await items('?state=lifted')).toEqual([liftedId]);
    expect(await items(`?limitId=${limitId}&from=2026-03-17T03:30:00Z&to=2026-03-17T03:40:00Z`)).toEqual([
      loudId,
    ]);
    expect(await items(`?limitId=${limitId + 99}`)).toEqual([]);
    await acknowledge(loudId, { note: 'Seen.' });
    expect(await items('?acknowledged=yes')).toEqual([loudId]);
    expect(await items('?acknowledged=no')).toEqual(all.filter((id) => id !== loudId));
    const first = (await (await call('?limit=2')).json()) as { items: Exceedance[]; next: string };
    const second = (await (await call(`?limit=2&cursor=${first.next}`)).json()) as typeof first;
    expect([...first.items, ...second.items].map(({ id }) => id)).toEqual(all);
    expect(second.next).toBeNull();
  });

  test.each(['?state=odd', '?acknowledged=perhaps', '?limitId=-1', '?from=yesterday', '?limit=0'])(
    'refuses %s',
    async (query) => expect((await call(query)).status).toBe(400),
  );

  test('the CSV says the same as the list, and a name that begins like a formula is text', async () => {
    await acknowledge(loudId, { note: '+1 on "this"\nreally', cause: 'loading', causeDetail: '@quay' });
    for (const query of ['', '?station=MER-01&state=standing']) {
      const text = await (await call(`.csv${query}`)).text();
      const rows = parse(text, { columns: true }) as Record<string, string>[];
      const list = ((await (await call(query)).json()) as { items: Exceedance[] }).items;
      expect(
        rows.map(({ id, level, threshold, from, state }) => [id, level, threshold, from, state]),
      ).toEqual(list.map((one) => [`${one.id}`, `${one.level}`, `${one.threshold}`, one.from, one.state]));
      expect(rows.at(-1)).toMatchObject({
        limit: `'=Night, "quay"`,
        note: `'+1 on "this"\nreally`,
        cause: 'loading',
        causeDetail: `'@quay`,
      });
    }
  });
});

describe('one exceedance', () => {
  test('has its level as it was compared, its spectrum beside the usual one, weather, neighbours and mail', async () => {
    const one = await detail(loudId, 'operator');
    expect(one).toMatchObject({
      station: 'MER-01',
      descriptor: 'LAeq,1 h',
      level: 57.4,
      threshold: 55,
      excess: 2.4,
      state: 'standing',
      limitThen: { version: 1, threshold: 55, recipients: [RECIPIENT] },
      limitNow: { version: 1, state: 'in-force' },
      usual: { weeks: 8, validWeeks: 4, median: 42.5 },
      tonality: 'assessed',
      conditions: { seconds: 3600, wind: null, flags: [{ flag: 'rain', seconds: 3600 }] },
      neighbours: [{ station: 'MER-02', LAeq: 41, meetsMinimum: true }],
      mails: [{ state: 'waiting', recipient: RECIPIENT }],
      revisions: [{ revision: 0, state: 'standing', level: 57.4 }],
    });
    expect(one.figures.LAeq).toBeCloseTo(57.4, 6);
    const hundred = one.bands.find(({ nominalHz }) => nominalHz === 100);
    expect(hundred).toMatchObject({ isStandingOut: true });
    expect(hundred?.Leq).toBeCloseTo(62.4, 6);
    expect(hundred?.usual).toBeCloseTo(47.5, 6);
    expect(one.standingOut[0]?.words).toMatch(
      /^100 Hz band stands out by 22\.4 dB: a tone .*; 14\.9 dB above/,
    );
  });

  test('one that was lifted says so, and keeps what it was found with', async () => {
    const one = await detail(liftedId);
    expect(one).toMatchObject({ state: 'lifted', level: 54.2, revision: 1 });
    expect(one.excess).toBeLessThan(0);
    expect(one.revisions).toMatchObject([
      { revision: 0, state: 'standing', level: 55.1 },
      { revision: 1, state: 'lifted', level: 54.2 },
    ]);
  });
});

describe('acknowledging', () => {
  const trail = () =>
    db()('audit_log')
      .where({ subject: `exceedance ${liftedId}` })
      .orderBy('id')
      .select('user_id', 'action', 'detail');

  test('keeps note and cause, may be changed, and the audit trail has both', async () => {
    const first = await acknowledge(liftedId, { note: 'Crane.', cause: 'loading' });
    expect(await first.json()).toMatchObject({
      exceedance: { acknowledgement: { note: 'Crane.', cause: 'loading', causeDetail: null } },
    });
    await acknowledge(liftedId, { note: 'A mower it was.', cause: 'other', causeDetail: 'mower' });
    expect((await detail(liftedId)).acknowledgement).toMatchObject({ cause: 'other', causeDetail: 'mower' });
    const entries = await trail();
    expect(entries.map(({ action }) => action)).toEqual([
      'exceedance.acknowledge',
      'exceedance.acknowledge-again',
    ]);
    expect(entries[1]).toMatchObject({
      user_id: userIds['operator'],
      detail: { before: { note: 'Crane.', cause: 'loading' }, after: { note: 'A mower it was.' } },
    });
    expect(await findAuditBreak()).toBeNull();
  });

  test('is refused when the exceedance is another than the one that was read', async () => {
    const { version } = await detail(liftedId);
    expect((await acknowledge(liftedId, { note: 'One.', version })).status).toBe(200);
    const second = await acknowledge(liftedId, { note: 'Two.', version });
    expect(second.status).toBe(409);
    expect(await second.json()).toMatchObject({ code: 'changed-meanwhile' });
    expect((await detail(liftedId)).acknowledgement?.note).toBe('One.');
  });

  test('a revision after it makes it outdated', async () => {
    await acknowledge(loudId, { note: 'Seen.' });
    expect((await detail(loudId)).acknowledgement?.isOutdated).toBe(false);
    await db()('exceedances')
      .where({ id: loudId })
      .update({ revised_at: new Date(Date.now() + 1000) });
    expect((await detail(loudId)).acknowledgement?.isOutdated).toBe(true);
  });

  test.each([
    ['no note', {}, 'note'],
    ['an empty note', { note: '  ' }, 'note'],
    ['a cause that is not of the list', { note: 'x', cause: 'ghosts' }, 'cause'],
    ['a long text', { note: 'x', causeDetail: 'y'.repeat(161) }, 'causeDetail'],
  ])('refuses %s', async (_, body, field) => {
    const answer = await acknowledge(loudId, body);
    expect(answer.status).toBe(422);
    expect(await answer.json()).toMatchObject({ fields: [{ field }] });
  });
});
