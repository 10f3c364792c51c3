import { beforeAll, expect, test } from 'vitest';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { judged, send } from './support';

useFreshSchema();

/** Tuesday 3 March 2026, 23:00 in London (GMT). */
const NIGHT_SEC = Date.parse('2026-03-03T23:00:00Z') / 1000;

let session: string;
let stationId: number;

/** Ten minutes of seconds at 45 dB; a passing of 20 s at 75 dB with one second's gap, and one of 4 s at 80 dB. */
async function sendPassings(): Promise<void> {
  const seconds = Array.from({ length: 600 }, (_, second) => {
    const isPassing = second >= 100 && second < 121 && second !== 110;
    const LAeq = isPassing ? 75 : second >= 300 && second < 304 ? 80 : 45;
    return { LAeq, LAFmax: LAeq + 3, levels: [LAeq - 5] };
  });
  await send(stationId, NIGHT_SEC, seconds, 1);
  await aggregateAll(async () => undefined);
}

beforeAll(async () => {
  const networkId = await makeNetwork('events');
  stationId = await makeStation(networkId, 'EV-1');
  ({ session } = await makePerson(networkId, ['operator']));
  await sendPassings();
});

const api = (path: string) => callApi('GET', `/api/v1/networks/events/exceedances/${path}`, { session });

test('the greatest LAE of an event is compared; the events are listed as the limit has them', async () => {
  const body = {
    name: 'Passings',
    metric: 'eventLAE',
    window: 'night',
    eventThreshold: 60,
    eventSeconds: 5,
    eventGap: 2,
    threshold: 85,
    effectiveFrom: '2026-03-01T00:00:00Z',
  };
  const set = await callApi('POST', '/api/v1/networks/events/limits', { session, body });
  expect(set.status).toBe(201);
  const changes = await judged();
  expect(changes).toHaveLength(1);
  // 20 s at 75 dB and a second at 45 dB, re 1 s.
  const laeDb = 10 * Math.log10(20 * 10 ** 7.5 + 10 ** 4.5);
  const [found] = changes;
  expect(found?.verdict.levelDb).toBeCloseTo(laeDb, 6);
  const { exceedance } = await (await api(`${found?.exceedanceId}`)).json();
  expect(exceedance).toMatchObject({
    level: 88,
    descriptor: 'LAE of one event above LAeq 60.0 dB within the night',
    limitThen: { eventThreshold: 60, eventSeconds: 5, eventGap: 2 },
    events: {
      count: 1,
      items: [{ from: '2026-03-03T23:01:40Z', to: '2026-03-03T23:02:01Z', seconds: 21, LAFmax: 78 }],
    },
  });
  const lines = (await (await api(`${found?.exceedanceId}/events.csv`)).text()).trim().split('\r\n');
  expect(lines).toHaveLength(2);
  expect(lines[1]).toMatch(/^EV-1,2026-03-03T23:01:40Z,2026-03-03T23:02:01Z,21,88\.0\d+,78,/);
});

test('a limit on another quantity lists no events', async () => {
  const body = {
    name: 'Maximum',
    metric: 'LAFmax',
    window: '15min',
    threshold: 80,
    effectiveFrom: '2026-03-01T00:00:00Z',
  };
  await callApi('POST', '/api/v1/networks/events/limits', { session, body });
  const [found] = await judged();
  expect(await (await api(`${found?.exceedanceId}`)).json()).toMatchObject({ exceedance: { events: null } });
  expect((await api(`${found?.exceedanceId}/events.csv`)).status).toBe(404);
});
