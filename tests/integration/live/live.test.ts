import { afterEach, beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { endSession } from '#lib/auth/sessions';
import { mayStillEnter } from '#lib/auth/mayStillEnter';
import { liveStream } from '#lib/http/liveStream';
import { MOST_LISTENERS_OF_ONE } from '#lib/services/live/listeners';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { readEvents, type EventReader } from './readEvents';

useFreshSchema();

const LIVE = '/api/v1/networks/merrow/live';
let networkId: number;
let token: string;
let foreignToken: string;
const open: EventReader[] = [];

const tokenOf = (stationId: number) =>
  inTransaction((transaction) => insertStationToken(stationId, null, transaction));

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  token = await tokenOf(await makeStation(networkId, 'MER-01'));
  foreignToken = await tokenOf(await makeStation(await makeNetwork('farther'), 'FAR-01'));
});

afterEach(async () => {
  await Promise.all(open.splice(0).map((reader) => reader.cancel()));
});

function listenTo(response: Response): EventReader {
  const reader = readEvents(response);
  open.push(reader);
  return reader;
}

async function post(stationToken: string, start: string, LAeq: number): Promise<void> {
  const body = { bands: [], intervals: [{ start, seconds: 60, LAeq }] };
  const answer = await callApi('POST', '/api/v1/intervals', { token: stationToken, body });
  expect(await answer.json()).toMatchObject({ accepted: 1 });
}

function minutesAgo(minutes: number): string {
  return new Date(Math.floor(Date.now() / 60_000 - minutes) * 60_000).toISOString().replace('.000', '');
}

describe('listening to a network', () => {
  test('a newest interval is told within two seconds of its acknowledgement, another network’s never', async () => {
    const { session } = await makePerson(networkId, ['regulator']);
    const response = await callApi('GET', LIVE, { session });
    expect(response.headers.get('content-type')).toContain('text/event-stream');
    expect(response.headers.get('cache-control')).toContain('no-transform');
    const reader = listenTo(response);
    await post(foreignToken, minutesAgo(2), 61);
    await post(token, minutesAgo(3), 52.3);
    const acknowledgedMs = Date.now();
    expect(await reader.next('interval')).toMatchObject({
      code: 'MER-01',
      start: minutesAgo(3),
      seconds: 60,
      LAeq: 52.3,
      state: 'live',
    });
    expect(Date.now() - acknowledgedMs).toBeLessThan(2000);
    await post(token, minutesAgo(2), 54.1);
    expect(await reader.next('interval')).toMatchObject({ code: 'MER-01', LAeq: 54.1 });
  });

  test('who comes later is told where each station stands', async () => {
    const { session } = await makePerson(networkId, ['operator']);
    const reader = listenTo(await callApi('GET', LIVE, { session }));
    expect(await reader.next('interval')).toMatchObject({ code: 'MER-01', LAeq: 54.1 });
  });

  test.each([
    ['signed out', async ({ session }: { session: string }) => void (await endSession(session))],
    [
      'without the role',
      async ({ userId }: { userId: string }) =>
        void (await db()('memberships').where({ user_id: userId }).delete()),
    ],
  ])('the stream ends for somebody who is %s meanwhile', async (_, lose) => {
    const person = await makePerson(networkId, ['liaison']);
    const request = new Request('http://127.0.0.1:4321/', {
      headers: { cookie: `bittern-session=${person.session}` },
    });
    const cookies = { get: () => ({ value: person.session }) };
    const context = { request, cookies } as unknown as Parameters<typeof mayStillEnter>[0];
    const mayListen = () => mayStillEnter(context, 'merrow', ['liaison']);
    const reader = listenTo(liveStream({ networkId, userId: person.userId, mayListen, checkEveryMs: 100 }));
    await reader.next('interval');
    await lose(person);
    expect(await reader.next('over')).toEqual({});
    expect(await reader.next('interval')).toBeNull();
  });

  test('one person listens a bounded number of times; leaving makes room', async () => {
    const { session } = await makePerson(networkId, ['operator']);
    for (let n = 0; n < MOST_LISTENERS_OF_ONE; n += 1) listenTo(await callApi('GET', LIVE, { session }));
    const refused = await callApi('GET', LIVE, { session });
    expect(refused.status).toBe(429);
    expect(refused.headers.get('retry-after')).toBe('30');
    expect(await refused.json()).toMatchObject({ code: 'too-many-listeners' });
    await open.pop()?.cancel();
    const again = await callApi('GET', LIVE, { session });
    expect(again.status).toBe(200);
    listenTo(again);
  });
});
