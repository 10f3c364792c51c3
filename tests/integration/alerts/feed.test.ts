import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { endFeed, feedsOf, makeFeed } from '#lib/services/people/feeds';
import { makeExceedance, makeLimit } from '../exceedances/support';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const PATH = '/api/v1/networks/merrow/exceedances.atom';
const START = Date.parse('2026-03-17T03:00:00Z') / 1000;
let networkId: number;
let person: { userId: string; session: string };

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  await makeNetwork('farther');
  const stationId = await makeStation(networkId, 'MER-01', { name: 'Quay <Head> & "sons"\u0007' });
  const limit = await makeLimit(networkId, 'Night');
  for (const [hour, levelDb] of [57.4, 58.1].entries()) {
    await makeExceedance({ networkId, stationId, limit, startSec: START + hour * 3600, levelDb });
  }
  person = await makePerson(networkId, ['regulator']);
});

const owner = () => ({ networkId, userId: person.userId });
const read = (query: string, path = PATH) => callApi('GET', `${path}${query}`);

test('a feed’s token opens the exceedances of its network, and neither another one nor the calendar', async () => {
  const token = await makeFeed(owner(), 'exceedances');
  const answer = await read(`?token=${token}`);
  expect(answer.status).toBe(200);
  expect(answer.headers.get('content-type')).toBe('application/atom+xml; charset=utf-8');
  const feed = await answer.text();
  expect(feed.match(/<entry>/g)).toHaveLength(2);
  expect(feed).toContain('MER-01 Quay &lt;Head&gt; &amp; &quot;sons&quot;: above the limit by 3.1 dB');
  expect(feed).toMatch(/98\s% covered/);
  expect(feed).not.toContain('\u0007');
  expect(feed).not.toContain(token);
  expect((await read(`?token=${token}`, '/api/v1/networks/farther/exceedances.atom')).status).toBe(404);
  expect((await read(`?token=${token}`, '/api/v1/networks/merrow/calibrations.ics')).status).toBe(404);
  expect((await read(`?token=${token}&state=lifted`)).status).toBe(200);
  expect((await read(`?token=${token}&state=odd`)).status).toBe(400);
  const calendar = await makeFeed(owner(), 'calendar');
  expect((await read(`?token=${calendar}`)).status).toBe(404);
  expect((await read('')).status).toBe(401);
  expect((await callApi('GET', PATH, { session: person.session })).status).toBe(200);
});

test('it ends when its person says so, or loses access', async () => {
  const token = await makeFeed(owner(), 'exceedances');
  const [newest] = await feedsOf(owner(), 'exceedances');
  expect(await endFeed(owner(), 'calendar', newest?.id ?? 0)).toBe(false);
  expect(await endFeed(owner(), 'exceedances', newest?.id ?? 0)).toBe(true);
  expect((await read(`?token=${token}`)).status).toBe(404);
  const second = await makeFeed(owner(), 'exceedances');
  await db()('memberships').where({ user_id: person.userId }).delete();
  expect((await read(`?token=${second}`)).status).toBe(404);
});
