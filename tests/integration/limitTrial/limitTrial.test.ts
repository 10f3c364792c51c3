import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertLimit } from '#db/queries/limits';
import { listStations } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { judgeDueWindows } from '#ingest/detect/judge';
import { receiveBatch } from '#ingest/receive/receive';
import { newLimitSchema } from '#lib/contracts/limits';
import { readEvents } from '#components/ui/readEvents.ts';
import type { LimitTrialAnswer } from '#lib/contracts/limitTrial';
import { addExclusion } from '#lib/services/exclusions/add';
import { pendLimit } from '#lib/services/limits/pendLimit';
import { readRule } from '#lib/services/limits/rule';
import type { Progress } from '#lib/services/threads/messages';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

/** The weekend on which summer time begins in London, and what lies about it. */
const FROM = '2026-03-28';
const TO = '2026-03-31';
const FROM_SEC = Date.parse(`${FROM}T00:00:00Z`) / 1000;
const TO_SEC = Date.parse('2026-03-30T23:00:00Z') / 1000;
const DAYS = 3;
const PATH = '/api/v1/networks/trial/limits/trial';

let networkId: number;
let operator: string;
let operatorId: string;

/** Levels that come and go by hours and minutes; every seventh quarter-hour lacks most of its minutes. */
async function measured(stationId: number, offsetDb: number): Promise<void> {
  for (let day = 0; day < DAYS; day += 1) {
    const intervals = [];
    for (let minute = day * 1440; minute < (day + 1) * 1440; minute += 1) {
      if (Math.floor(minute / 15) % 7 === 3 && minute % 15 > 9 - (minute % 4)) continue;
      const swing = 9 * Math.sin(minute / 97) + 6 * Math.sin(minute / 11) + 3 * Math.sin(minute * 1.7);
      const LAeq = Math.round((55 + offsetDb + swing) * 10) / 10;
      intervals.push({
        start: new Date((FROM_SEC + minute * 60) * 1000).toISOString(),
        seconds: 60,
        LAeq,
        LAFmax: LAeq + 6 + 4 * Math.cos(minute),
        // Never above the network's bound, and not always known.
        ...(minute % 13 === 0 ? {} : { windSpeed: Math.round(250 + 240 * Math.sin(minute / 83)) / 100 }),
        levels: [LAeq - 2, LAeq - 5 + 3 * Math.sin(minute / 5), LAeq - 6, minute % 60 < 50 ? LAeq - 9 : null],
      });
    }
    const envelope = {
      bands: [80, 100, 125, 160],
      bandIndices: { indices: [-11, -10, -9, -8] },
      intervals,
    };
    await receiveBatch({ id: stationId, bandFraction: 3, acceptsFromSec: null }, envelope, new Date());
  }
}

beforeAll(async () => {
  networkId = await makeNetwork('trial');
  const first = await makeStation(networkId, 'TR-1');
  const second = await makeStation(networkId, 'TR-2');
  ({ session: operator, userId: operatorId } = await makePerson(networkId, ['operator']));
  await measured(first, 0);
  await measured(second, 4);
  await addExclusion({
    networkId,
    stationCode: 'TR-2',
    fromSec: FROM_SEC + 6 * 3600,
    toSec: FROM_SEC + 13 * 3600,
    reason: 'Mowing',
    userId: operatorId,
  });
});

async function tried(limit: object, changes: object = {}): Promise<LimitTrialAnswer> {
  const body = { limit: { name: 'Trial', ...limit }, from: FROM, to: TO, ...changes };
  const response = await callApi('POST', PATH, { session: operator, body });
  const answer = (await response.json()) as LimitTrialAnswer;
  expect(response.status, JSON.stringify(answer)).toBe(200);
  return answer;
}

/** Sets a limit from the first date on, with its windows to be judged. */
async function set(limit: object): Promise<number> {
  const read = readRule(
    newLimitSchema.parse({ name: 'Trial', ...limit }),
    { stations: await listStations(networkId), groups: [] },
    FROM_SEC,
  );
  if (!read.isValid) throw new Error(JSON.stringify(read.problems));
  const version = { ...read.version, effectiveFromSec: FROM_SEC, createdBy: null };
  return inTransaction(async (transaction) => {
    const id = await insertLimit(networkId, version, transaction);
    await pendLimit(networkId, id, FROM_SEC, transaction);
    return id;
  });
}

/** What the worker finds by a limit. */
async function judged(limit: object) {
  const limitId = await set(limit);
  while ((await judgeDueWindows(new Date(), async () => undefined)) > 0);
  return db()('exceedances as e')
    .join('stations as s', 's.id', 'e.station_id')
    .where({ limit_id: limitId })
    .where('starts_at', '<', TO_SEC)
    .orderBy(['starts_at', 'e.station_id'])
    .select({
      station: 's.code',
      from: 'starts_at',
      to: 'ends_at',
      level: 'level_db',
      coverage: 'coverage',
    });
}

const seconds = (instant: string) => Date.parse(instant) / 1000;

const LIMITS = [
  { metric: 'LAeq', window: '15min', threshold: 68 },
  { metric: 'LAeq', window: '15min', threshold: 66, minimumCoverage: 0.5, from: '22:00', to: '05:00' },
  { metric: 'LAeq', window: '1h', threshold: 63.5, weekdays: ['sat', 'sun'], stations: ['TR-2'] },
  { metric: 'LAeq', window: 'night', threshold: 55 },
  { metric: 'LAFmax', window: '15min', threshold: 84 },
  { metric: 'bandLeq', window: '15min', bandFraction: 3, bandHz: 100, threshold: 64 },
  { metric: 'bandLeq', window: '1h', bandFraction: 1, bandHz: 125, threshold: 62 },
  { metric: 'LAeq', window: 'length', windowMinutes: 5, threshold: 72 },
  { metric: 'LAFmax', window: 'length', windowMinutes: 240, threshold: 84 },
  { metric: 'LAeq', window: 'hours', from: '22:00', to: '06:00', threshold: 55 },
  { metric: 'LAeq', window: '1h', stepMinutes: 15, threshold: 63 },
  { metric: 'LAN', percent: 10, window: '1h', threshold: 68 },
  { metric: 'LAeqLessLA90', window: 'length', windowMinutes: 120, threshold: 9 },
  { metric: 'bandGroupLeq', bandFraction: 3, bandHz: 80, bandToHz: 125, window: '1h', threshold: 65 },
  { metric: 'Lden', window: 'den', threshold: 60 },
  { metric: 'LAeq', window: '1h', threshold: 61, windMaximum: 3, minimumCoverage: 0.3 },
  { metric: 'LAeq', window: '1h', stepMinutes: 15, threshold: 61, windMinimum: 2, minimumCoverage: 0.3 },
  { metric: 'LAeq', window: '15min', threshold: 66, windDismissAbove: 3, windUnknown: 'counts' },
  {
    metric: 'LAeqLessLA90',
    window: '1h',
    threshold: 12,
    percent: 95,
    backgroundFrom: '23:00',
    backgroundTo: '05:00',
  },
  { metric: 'eventLAE', window: '1h', eventThreshold: 65, eventSeconds: 60, eventGap: 60, threshold: 92 },
  {
    metric: 'LAeq',
    window: '1h',
    stepMinutes: 5,
    threshold: 62,
    from: '20:00',
    to: '04:00',
    weekdays: ['sat', 'sun'],
  },
  {
    metric: 'bandLeq',
    window: 'length',
    windowMinutes: 30,
    stepMinutes: 5,
    bandFraction: 3,
    bandHz: 100,
    threshold: 64,
  },
] as const;

test.sequential('before anything is computed and after, a trial finds the same', async () => {
  const before = await tried(LIMITS[0]);
  expect(before.trial.counts.caught).toBeGreaterThan(5);
  await aggregateAll(async () => undefined);
  expect(await tried(LIMITS[0])).toEqual(before);
});

test.sequential.each(LIMITS)(
  'the windows of a trial are the exceedances of the worker: %o',
  async (limit) => {
    const { windows, trial } = await tried(limit);
    const found = await judged(limit);
    expect(found.length).toBeGreaterThan(0);
    expect(trial.counts.caught).toBe(found.length);
    expect(
      windows.map(({ station, from, to }) => ({ station, from: seconds(from), to: seconds(to) })),
    ).toEqual(found.map(({ station, from, to }) => ({ station, from, to })));
    windows.forEach(({ level, coverage, above }, at) => {
      expect(level).toBeCloseTo(found[at]?.level, 6);
      expect(coverage).toBeCloseTo(found[at]?.coverage, 6);
      expect(above).toBeGreaterThan(0);
    });
  },
);

test('counts add up, by station and by week; windows that end together are told in one e-mail', async () => {
  const { trial, windows } = await tried(LIMITS[0]);
  const { counts, stations, weeks, mails } = trial;
  // Three days, one of 23 hours, of two stations.
  expect(counts.windows).toBe(2 * (3 * 96 - 4));
  expect(counts.compared + counts.uncovered + counts.empty).toBe(counts.windows);
  expect(counts.uncovered).toBeGreaterThan(0);
  expect(stations.reduce((sum, { caught }) => sum + caught, 0)).toBe(counts.caught);
  expect(weeks.map(({ from }) => from)).toEqual(['2026-03-23', '2026-03-30']);
  expect(weeks.reduce((sum, { caught }) => sum + caught, 0)).toBe(counts.caught);
  expect(mails).toBe(new Set(windows.map(({ to }) => to)).size);
});

test('beside today’s version of a limit: what both catch, and what only one of them does', async () => {
  const limitId = await set({ metric: 'LAeq', window: '15min', threshold: 69 });
  const stricter = await tried(LIMITS[0], { basedOn: limitId });
  expect(stricter.today).toMatchObject({ limitId, version: 1, threshold: 69, caughtAlone: 0 });
  const both = stricter.windows.filter(({ isCaughtToday }) => isCaughtToday).length;
  expect(both).toBe(stricter.today?.counts.caught);
  expect(both).toBeLessThan(stricter.windows.length);
  const looser = await tried({ metric: 'LAeq', window: '15min', threshold: 70 }, { basedOn: limitId });
  expect(looser.onlyToday).toHaveLength(looser.today?.caughtAlone ?? NaN);
  expect(looser.trial.counts.caught + looser.onlyToday.length).toBe(looser.today?.counts.caught);
});

test('nothing is set, stored or told', async () => {
  const before = await Promise.all(
    ['limits', 'exceedances', 'outbox', 'audit_log'].map((name) => rows(name)),
  );
  await tried(LIMITS[0]);
  expect(
    await Promise.all(['limits', 'exceedances', 'outbox', 'audit_log'].map((name) => rows(name))),
  ).toEqual(before);
});

const IN_WIND = {
  name: 'Trial',
  metric: 'LAeq',
  window: '1h',
  threshold: 61,
  windMaximum: 3,
  minimumCoverage: 0.3,
};
const YEAR = { limit: IN_WIND, from: '2025-04-01', to: TO };

test('a wind rule is tried on a year, telling how far it is, and finds what it finds on the days with data', async () => {
  const days = await tried(IN_WIND);
  expect(days.windows.length).toBeGreaterThan(0);
  const answer = await callApi('POST', PATH, {
    session: operator,
    headers: { Accept: 'text/event-stream' },
    body: YEAR,
  });
  const events: { name: string; data: unknown }[] = [];
  if (!answer.body) throw new Error('No events.');
  await readEvents(answer.body, (name, data) => events.push({ name, data }));
  const progress = events.filter(({ name }) => name === 'progress').map(({ data }) => data as Progress);
  expect(progress.length).toBeGreaterThan(2);
  progress.forEach(({ done, all }, at) => {
    expect(all).toBe(2 * 364);
    expect(done).toBeGreaterThanOrEqual(progress[at - 1]?.done ?? 0);
  });
  expect(events.at(-1)?.name).toBe('result');
  const { windows, trial } = events.at(-1)?.data as LimitTrialAnswer;
  expect(windows).toEqual(days.windows);
  expect(trial.counts.windows).toBe(2 * (364 * 24 - 1) + 2);
});

test('who leaves ends a long trial, and the next one is not kept waiting', async () => {
  const left = await callApi('POST', PATH, {
    session: operator,
    headers: { Accept: 'text/event-stream' },
    body: {
      ...YEAR,
      limit: { ...IN_WIND, metric: 'LAeqLessLA90', backgroundFrom: '23:00', backgroundTo: '05:00' },
    },
  });
  const reader = left.body?.getReader();
  await reader?.read();
  await reader?.cancel();
  expect((await tried(IN_WIND, { from: '2026-02-20' })).windows.length).toBeGreaterThan(0);
});

const rows = async (table: string) => (await db()(table).count({ count: '*' }))[0]?.['count'];

test.each<[field: string, changes: { limit?: object; from?: string; to?: string }]>([
  ['limit.threshold', { limit: { threshold: 900 } }],
  ['to', { to: FROM }],
  ['to', { from: '2024-01-01' }],
  ['from', { from: '2026-02-30' }],
  ['stations', { limit: { stations: ['XX-1'] } }],
])('what does not fit is refused by its field: %s', async (field, changes) => {
  const limit = { name: 'Trial', ...LIMITS[0], ...changes.limit };
  const body = { from: FROM, to: TO, ...changes, limit };
  const response = await callApi('POST', PATH, { session: operator, body });
  expect(response.status).toBe(422);
  const { fields } = (await response.json()) as { fields: { field: string }[] };
  expect(fields.map((one) => one.field)).toContain(field);
});

test('operators only; a limit of another network is not there', async () => {
  const body = { limit: { name: 'Trial', ...LIMITS[0] }, from: FROM, to: TO };
  for (const role of ['regulator', 'liaison'] as const) {
    const { session } = await makePerson(networkId, [role]);
    expect((await callApi('POST', PATH, { session, body })).status).toBe(403);
  }
  const elsewhere = await makeNetwork('elsewhere');
  const { session } = await makePerson(elsewhere, ['operator']);
  expect((await callApi('POST', PATH, { session, body })).status).toBe(404);
  const limitId = await set({ metric: 'LAeq', window: '1h', threshold: 90 });
  await makeStation(elsewhere, 'EW-1');
  const foreign = await callApi('POST', PATH.replace('trial/', 'elsewhere/'), {
    session,
    body: { ...body, basedOn: limitId },
  });
  expect(foreign.status).toBe(404);
});
