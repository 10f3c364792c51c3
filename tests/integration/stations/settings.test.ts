import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { findNetworkById, type NetworkRow } from '#db/queries/networks';
import { submitForm } from '#lib/http/forms';
import { changeNetworkFromForm } from '#lib/http/networkForm';
import { settingsFormText, settingsTimeline } from '#lib/services/networks/formValues';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { postedForm, roleSessions, type Sessions } from './support';

useFreshSchema();

const zone = 'Europe/London';
let networkId: number;
let userId: string;
let sessions: Sessions;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  ({ userId } = await makePerson(networkId, ['operator']));
  sessions = await roleSessions(networkId, await makeNetwork('farther'));
});

async function network(): Promise<NetworkRow> {
  const found = await findNetworkById(networkId);
  if (!found) throw new Error('The network is gone.');
  return found;
}

const formNow = async () => {
  const settings = (await settingsTimeline(networkId)).at(-1);
  return settings ? settingsFormText(await network(), settings) : {};
};

const submit = async (fields: Record<string, string>) => {
  const row = await network();
  const nowSec = Math.floor(Date.now() / 1000);
  return submitForm(postedForm(fields), (values) =>
    changeNetworkFromForm(values, row, { userId, zone, nowSec }),
  );
};

test('the form as it stands changes nothing', async () => {
  expect(await submit(await formNow())).toMatchObject({ isDone: true });
  expect(await settingsTimeline(networkId)).toHaveLength(1);
  expect(await db()('audit_log').where({ action: 'network.change' })).toEqual([]);
});

test('a preset stands for its hours, an empty evening for none, a change holds from now on', async () => {
  const before = await formNow();
  expect(await submit({ ...before, preset: 'us-dnl', minimumCoverage: '87,5' })).toMatchObject({
    isDone: true,
  });
  const timeline = await settingsTimeline(networkId);
  expect(timeline).toHaveLength(2);
  expect(timeline[0]).toMatchObject({ minimumCoverage: 0.75, scheme: { eveningStartMin: 1140 } });
  expect(timeline[1]).toMatchObject({
    minimumCoverage: 0.875,
    scheme: { dayStartMin: 420, eveningStartMin: null, nightStartMin: 1320 },
  });
  expect(await formNow()).toMatchObject({ evening: '', minimumCoverage: '87.5' });
  const entry = await db()('audit_log').where({ action: 'network.change' }).first('detail');
  expect(entry.detail.before.settings.minimumCoverage).toBe(0.75);
});

test('a time that has passed needs a word, one to come does not', async () => {
  const form = { ...(await formNow()), maximumWindSpeed: '7' };
  const past = await submit({ ...form, effectiveFrom: '2026-03-01T00:00' });
  expect(!past.isDone && past.errors).toEqual({ recompute: 'must be ticked, as the time above has passed' });
  expect(await submit({ ...form, effectiveFrom: '2026-03-01T00:00', recompute: 'yes' })).toMatchObject({
    isDone: true,
  });
  expect(await submit({ ...form, maximumWindSpeed: '6', effectiveFrom: '2099-01-01T00:00' })).toMatchObject({
    isDone: true,
  });
  const winds = (await settingsTimeline(networkId)).map(({ rules }) => rules.maximumWindSpeedMs);
  expect(winds).toEqual([5, 7, 5, 6]);
});

test('every wrong field is told at once, by its name', async () => {
  const wrong = {
    name: '',
    timeZone: 'Europe/Merrow',
    day: '23:00',
    evening: '19:00',
    night: '7',
    minimumCoverage: '120',
    maximumWindSpeed: '',
    effectiveFrom: 'soon',
  };
  const outcome = await submit({ ...wrong, preset: '', excludeRain: 'no' });
  if (outcome.isDone) throw new Error('It was saved.');
  expect(Object.keys(outcome.errors)).toEqual([
    'name',
    'timeZone',
    'periods',
    'minimumCoverage',
    'maximumWindSpeed',
    'effectiveFrom',
  ]);
  expect(outcome.values.text).toMatchObject(wrong);
  expect((await submit({})).isDone).toBe(false);
});

test('is for operators and administrators of this network only', async () => {
  const statuses = await Promise.all(
    Object.entries(sessions).map(async ([who, session]) => {
      const body = { name: 'Merrow estuary' };
      return [who, (await callApi('PATCH', '/api/v1/networks/merrow', { session, body })).status];
    }),
  );
  expect(Object.fromEntries(statuses)).toEqual({
    nobody: 401,
    stranger: 404,
    regulator: 403,
    liaison: 403,
    operator: 200,
    administrator: 200,
  });
});
