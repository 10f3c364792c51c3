import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { remindCalibrations } from '#ingest/health/remindCalibrations';
import { makeFeed } from '#lib/services/people/feeds';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

const dataDir = mkdtempSync(join(tmpdir(), 'bittern-test-data-'));
process.env['BITTERN_DATA_DIR'] = dataDir;
useFreshSchema();
afterAll(() => rmSync(dataDir, { recursive: true, force: true }));

const network = '/api/v1/networks/reeds';
const base = `${network}/calibrations`;
let networkId: number;
let operator: { session: string };
let operatorId: string;
let regulator: { session: string };
let foreigner: { session: string };

beforeAll(async () => {
  networkId = await makeNetwork('reeds');
  const foreign = await makeNetwork('foreign');
  for (const code of ['RD-1', 'RD-2', 'RD-3', 'RD-4']) await makeStation(networkId, code);
  const person = await makePerson(networkId, ['operator']);
  operator = { session: person.session };
  operatorId = person.userId;
  regulator = { session: (await makePerson(networkId, ['regulator'])).session };
  foreigner = { session: (await makePerson(foreign, ['operator'])).session };
});

let serial = 100;
async function instrumentAtStation(station: string, from: string): Promise<number> {
  serial += 1;
  const body = { serialNumber: String(serial), class: 1 };
  const { instrument } = await (
    await callApi('POST', `${network}/instruments`, { ...operator, body })
  ).json();
  const stay = await callApi('POST', `${network}/instruments/${instrument.id}/deployments`, {
    ...operator,
    body: { station, from },
  });
  expect(stay.status).toBe(201);
  return instrument.id;
}

async function addCheck(instrument: number, checkedAt: string, before: number, after: number | null = null) {
  const body = { instrument, checkedAt, calibratorLevel: 94, before, after, checkedBy: 'R. Sedge' };
  const response = await callApi('POST', base, { ...operator, body });
  expect(response.status).toBe(201);
  return (await response.json()).calibration as { id: number; drift: number; station: string | null };
}

interface ListedDoubt {
  calibration: number;
  station: string;
  from: string;
  to: string | null;
  state: string;
}
async function doubtsAt(station: string): Promise<ListedDoubt[]> {
  const { items } = await (await callApi('GET', `${base}/doubts`, regulator)).json();
  return items.filter((one: ListedDoubt) => one.station === station);
}

describe('checks', () => {
  test('tell the drift and where the instrument stood', async () => {
    const instrument = await instrumentAtStation('RD-1', '2026-01-01T00:00:00Z');
    expect(await addCheck(instrument, '2026-01-01T00:00:00Z', 94.02)).toMatchObject({
      drift: 0.02,
      station: 'RD-1',
      isWithinBound: true,
    });
    expect(await addCheck(instrument, '2026-02-01T00:00:00Z', 93.5)).toMatchObject({ isWithinBound: true });
    expect(await doubtsAt('RD-1')).toEqual([]);
  });

  test('a drift above the bound makes the time since the last good check doubtful, and the operator excludes it', async () => {
    const instrument = await instrumentAtStation('RD-2', '2026-01-01T00:00:00Z');
    await addCheck(instrument, '2026-02-01T00:00:00Z', 94);
    const bad = await addCheck(instrument, '2026-03-01T00:00:00Z', 93.49, 94);
    const stretch = { calibration: bad.id, station: 'RD-2', from: '2026-02-01T00:00:00Z' };
    expect(await doubtsAt('RD-2')).toMatchObject([
      { ...stretch, to: '2026-03-01T00:00:00Z', state: 'undecided' },
    ]);
    const body = { ...stretch, decision: 'exclude', reason: 'microphone was wet' };
    expect((await callApi('POST', `${base}/doubts`, { ...regulator, body })).status).toBe(403);
    expect((await callApi('POST', `${base}/doubts`, { ...foreigner, body })).status).toBe(404);
    const decided = await callApi('POST', `${base}/doubts`, { ...operator, body });
    expect((await decided.json()).doubt.state).toBe('excluded');
    expect((await callApi('POST', `${base}/doubts`, { ...operator, body })).status).toBe(409);
    const [exclusion] = await db()('exclusions').orderBy('id', 'desc');
    expect(exclusion).toMatchObject({
      starts_at: Date.parse('2026-02-01T00:00:00Z') / 1000,
      ends_at: Date.parse('2026-03-01T00:00:00Z') / 1000,
      reason: 'microphone was wet',
    });
    const withdrawal = { ...operator, body: { reason: 'only the calibrator was off' } };
    await callApi('POST', `${network}/exclusions/${exclusion.id}/withdrawal`, withdrawal);
    expect(await doubtsAt('RD-2')).toMatchObject([{ state: 'undecided' }]);
    const kept = await callApi('POST', `${base}/doubts`, {
      ...operator,
      body: { ...body, decision: 'keep' },
    });
    expect((await kept.json()).doubt).toMatchObject({
      state: 'kept',
      decision: { reason: 'microphone was wet' },
    });
    await callApi('POST', `${base}/${bad.id}/withdrawal`, {
      ...operator,
      body: { reason: 'other instrument' },
    });
    expect(await doubtsAt('RD-2')).toEqual([]);
  });

  test('an instrument left as it was stays doubtful, which nobody can decide yet', async () => {
    const instrument = await instrumentAtStation('RD-3', '2026-01-01T00:00:00Z');
    const bad = await addCheck(instrument, '2026-02-01T00:00:00Z', 95);
    const [open, first] = await doubtsAt('RD-3');
    expect(open).toMatchObject({ from: '2026-02-01T00:00:00Z', to: null });
    expect(first).toMatchObject({ from: '2026-01-01T00:00:00Z', to: '2026-02-01T00:00:00Z' });
    const body = {
      calibration: bad.id,
      station: 'RD-3',
      from: open?.from,
      decision: 'keep',
      reason: 'small',
    };
    expect((await callApi('POST', `${base}/doubts`, { ...operator, body })).status).toBe(422);
  });

  test('wrong levels and times to come are refused by field', async () => {
    const body = {
      instrument: 1,
      checkedAt: '2099-01-01T00:00:00Z',
      calibratorLevel: 94,
      before: 94,
      checkedBy: 'x',
    };
    const answers = [
      await callApi('POST', base, { ...operator, body }),
      await callApi('POST', base, { ...operator, body: { ...body, before: 500 } }),
      await callApi('POST', base, { ...operator, body: { ...body, instrument: 99_999 } }),
    ];
    const fields = await Promise.all(answers.map(async (answer) => (await answer.json()).fields[0].field));
    expect(fields).toEqual(['checkedAt', 'before', 'instrument']);
  });
});

describe('certificates', () => {
  test('are taken by what their bytes are, kept outside what is served, and given as a file to keep', async () => {
    const { id } = await addCheck(1, '2026-04-01T00:00:00Z', 94);
    const path = `${base}/${id}/certificate`;
    const pdf = Buffer.from('%PDF-1.7\nnot really');
    expect((await callApi('GET', path, operator)).status).toBe(404);
    for (const wrong of ['<script>alert(1)</script>', '<svg xmlns="http://www.w3.org/2000/svg"/>', '']) {
      const headers = { 'content-type': 'application/pdf' };
      const refused = await callApi('PUT', path, { ...operator, headers, body: Buffer.from(wrong) });
      expect(refused.status).toBe(422);
    }
    const large = Buffer.concat([pdf, Buffer.alloc(10 * 1024 * 1024)]);
    expect((await callApi('PUT', path, { ...operator, body: large })).status).toBe(413);
    expect((await callApi('PUT', path, { ...regulator, body: pdf })).status).toBe(403);
    expect(await db()('calibration_certificates')).toEqual([]);
    const kept = await callApi('PUT', path, { ...operator, body: pdf });
    expect((await kept.json()).calibration.certificate).toMatchObject({ type: 'application/pdf', bytes: 19 });
    expect(readdirSync(join(dataDir, 'certificates'))).toHaveLength(1);
    const file = await callApi('GET', path, regulator);
    expect(Buffer.from(await file.arrayBuffer())).toEqual(pdf);
    expect(Object.fromEntries(file.headers)).toMatchObject({
      'content-type': 'application/pdf',
      'x-content-type-options': 'nosniff',
      'content-disposition': expect.stringMatching(/^attachment; filename="[\w.-]+\.pdf"$/),
    });
    expect((await callApi('GET', path, foreigner)).status).toBe(404);
  });
});

describe('due dates', () => {
  test('a reminder is put once, whoever runs it how often, and again when the next check falls due', async () => {
    await db()('outbox').delete();
    const instrument = await instrumentAtStation('RD-4', '2026-01-01T00:00:00Z');
    await addCheck(instrument, '2026-01-01T12:00:00Z', 94);
    const ofIt = async () =>
      db()('outbox').where('subject', 'like', `%of ${serial} %`).orderBy('id').select('recipient', 'subject');
    await remindCalibrations(new Date('2026-12-17T23:30:00Z'));
    expect(await ofIt()).toEqual([]);
    const due = new Date('2026-12-18T00:00:00Z');
    await Promise.all([remindCalibrations(due), remindCalibrations(due)]);
    await remindCalibrations(new Date('2027-01-20T00:00:00Z'));
    const { email } = await db()('users').where({ id: operatorId }).first('email');
    expect(await ofIt()).toEqual([
      { recipient: email, subject: expect.stringContaining('is due Fri 1 January 2027') },
    ]);
    await db()('calibrations').where({ instrument_id: instrument }).update({ checked_at: 1_798_800_000 });
    await remindCalibrations(new Date('2028-01-20T00:00:00Z'));
    expect(await ofIt()).toHaveLength(2);
  });

  test('the calendar is read by its own token, for as long as the person may see the network', async () => {
    const person = await makePerson(networkId, ['liaison']);
    const token = await makeFeed({ networkId, userId: person.userId }, 'calendar');
    const path = `${network}/calibrations.ics`;
    const calendar = await callApi('GET', `${path}?token=${token}`);
    expect(calendar.status).toBe(200);
    expect(await calendar.text()).toContain('BEGIN:VEVENT');
    expect((await callApi('GET', path)).status).toBe(401);
    expect((await callApi('GET', `${path}?token=bc_wrong`)).status).toBe(404);
    expect((await callApi('GET', `/api/v1/networks/foreign/calibrations.ics?token=${token}`)).status).toBe(
      404,
    );
    expect((await callApi('GET', `${network}/stations`, { token })).status).toBe(401);
    await db()('memberships').where({ user_id: person.userId }).delete();
    expect((await callApi('GET', `${path}?token=${token}`)).status).toBe(404);
  });

  test('the bound is a setting, and checks noted before keep theirs', async () => {
    const settings = {
      driftBound: 1,
      checkEveryDays: 180,
      remindBeforeDays: 7,
      recipients: ['lab@merrow.example'],
    };
    expect((await callApi('PUT', `${base}/settings`, { ...regulator, body: settings })).status).toBe(403);
    const wrong = { ...settings, recipients: ['nobody'] };
    expect((await callApi('PUT', `${base}/settings`, { ...operator, body: wrong })).status).toBe(422);
    expect((await callApi('PUT', `${base}/settings`, { ...operator, body: settings })).status).toBe(200);
    expect(await addCheck(1, '2026-06-01T00:00:00Z', 94.9)).toMatchObject({
      driftBound: 1,
      isWithinBound: true,
    });
    const [doubt] = await doubtsAt('RD-3');
    expect(doubt).toMatchObject({ driftBound: 0.5 });
  });
});
