import { beforeAll, expect, test } from 'vitest';
import { listSettings } from '#db/queries/networks';
import { findStationById, type StationRow } from '#db/queries/stations';
import { pool } from '#db/queries/connection';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import type { MetricRule } from '#lib/services/limits/measure';
import { WindowEvidence } from '#lib/services/limits/windowEvidence';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { send } from './support';

useFreshSchema();

/** Tuesday 3 March 2026, midnight in London (GMT). */
const DAY_SEC = Date.parse('2026-03-03T00:00:00Z') / 1000;
const HOUR = { fromSec: DAY_SEC + 10 * 3600, toSec: DAY_SEC + 11 * 3600 };

let station: StationRow;
let operator: string;

/** A day of minutes: 50 dB, and 70 dB in minutes 0–5 and 30–35 of each hour, in which 125 Hz stands out. */
async function day(startSec: number, offsetDb: number): Promise<void> {
  const minutes = Array.from({ length: 1440 }, (_, minute) => {
    const isLoud = minute % 30 < 6;
    const LAeq = (isLoud ? 70 : 50) + offsetDb;
    const levels = isLoud ? [50, 50, 70, 50, 50] : [50, 50, 50, 50, 50];
    return { LAeq, LCeq: LAeq + 12, levels };
  });
  await send(station.id, startSec, minutes);
}

beforeAll(async () => {
  const networkId = await makeNetwork('metrics');
  const found = await findStationById(await makeStation(networkId, 'ME-1'));
  if (!found) throw new Error('No station.');
  station = found;
  ({ session: operator } = await makePerson(networkId, ['operator']));
  await day(DAY_SEC, 0);
  await day(DAY_SEC + 86_400, 0);
  for (const [weeks, offsetDb] of [
    [1, -3],
    [2, -5],
    [3, -4],
  ] as const)
    await day(DAY_SEC - weeks * 7 * 86_400, offsetDb);
  await aggregateAll(async () => undefined);
});

async function measured(rule: Partial<MetricRule>, window = HOUR) {
  const timeline = await listSettings(station.networkId);
  const evidence = new WindowEvidence({ station, timeline, validity: 'rules' }, pool());
  const whole = {
    metric: 'LAeq',
    bandFraction: null,
    bandIndex: null,
    minimumCoverage: null,
    ...rule,
  } as const;
  return evidence.measure(whole, window);
}

/** 12 of 60 minutes at 70 dB, the rest at 50 dB. */
const MEAN_DB = 10 * Math.log10((12 * 1e7 + 48 * 1e5) / 60);

test.each<[name: string, rule: Partial<MetricRule>, expected: number]>([
  ['LA10', { metric: 'LAN', percent: 10 }, 70],
  ['LA50', { metric: 'LAN', percent: 50 }, 50],
  ['LAE', { metric: 'LAE' }, MEAN_DB + 10 * Math.log10(3600)],
  ['LAeq − LA90', { metric: 'LAeqLessLA90' }, MEAN_DB - 50],
  ['LCeq − LAeq', { metric: 'LCeqLessLAeq' }, 12],
  // 80 and 100 Hz at 50 dB, and 125 Hz by its own mean.
  [
    'a group of bands',
    { metric: 'bandGroupLeq', bandFraction: 3, bandIndex: -11, bandToIndex: -9 },
    10 * Math.log10(2 * 1e5 + 10 ** (MEAN_DB / 10)),
  ],
  // Median of 3, 4 and 5 dB quieter weeks.
  ['above the usual', { metric: 'LAeqLessUsual' }, 4],
  ['tonal share', { metric: 'tonalShare' }, 20],
  ['events', { metric: 'eventCount', eventTenths: 600, eventMinimumSec: 120 }, 2],
  // Two stretches of six minutes at 70 dB; where gaps of 24 minutes end none, one with what lies between.
  [
    'LAE of one event',
    { metric: 'eventLAE', eventTenths: 600, eventMinimumSec: 120, eventGapSec: 10 },
    70 + 10 * Math.log10(360),
  ],
  [
    'LAE of one event over its gap',
    { metric: 'eventLAE', eventTenths: 600, eventMinimumSec: 120, eventGapSec: 1440 },
    10 * Math.log10(720 * 1e7 + 1440 * 1e5),
  ],
  ['LAeq − LA95', { metric: 'LAeqLessLA90', percent: 95 }, MEAN_DB - 50],
  ['events that are too short', { metric: 'eventCount', eventTenths: 600, eventMinimumSec: 361 }, 0],
])('%s of an hour', async (_, rule, expected) => {
  const { levelDb, validSec } = await measured(rule);
  expect(levelDb).toBeCloseTo(expected, 6);
  expect(validSec).toBe(3600);
});

test('a background of hours of its own is that of the last ones before the window', async () => {
  const hours = {
    metric: 'LAeqLessLA90',
    backgroundFromMin: 23 * 60,
    backgroundToMin: 23 * 60 + 30,
  } as const;
  const next = { fromSec: HOUR.fromSec + 86_400, toSec: HOUR.toSec + 86_400 };
  expect((await measured(hours, next)).levelDb).toBeCloseTo(MEAN_DB - 50, 6);
  // The evening before has no data: not known, not 0.
  expect(await measured(hours)).toEqual({ levelDb: null, validSec: 3600 });
});

test('Lden of a date stands on its least covered period', async () => {
  const date = { fromSec: DAY_SEC + 7 * 3600, toSec: DAY_SEC + 31 * 3600 };
  const { levelDb, validSec } = await measured({ metric: 'Lden' }, date);
  const penalties = (12 + 4 * 10 ** 0.5 + 8 * 10) / 24;
  expect(levelDb).toBeCloseTo(MEAN_DB + 10 * Math.log10(penalties), 6);
  expect(validSec).toBe(86_400);
  // Of the date after it a third of the evening and the night is not there.
  const next = { fromSec: date.fromSec + 86_400, toSec: date.toSec + 86_400 };
  expect(await measured({ metric: 'Lden' }, next)).toMatchObject({ validSec: (86_400 * 1) / 8 });
});

test('what does not go together is refused by its field', async () => {
  const limit = { name: 'Any', metric: 'LAeq', window: 'night', threshold: 45 };
  const refused: [field: string, limit: object][] = [
    ['percent', { metric: 'LAN' }],
    ['percent', { percent: 10 }],
    ['bandToHz', { metric: 'bandGroupLeq', bandFraction: 3, bandHz: 100, bandToHz: 100 }],
    ['window', { metric: 'Lden' }],
    ['window', { window: 'den' }],
    ['eventSeconds', { metric: 'eventCount', eventThreshold: 60 }],
    ['eventGap', { eventGap: 5 }],
    ['backgroundTo', { metric: 'LAeqLessLA90', backgroundFrom: '23:00' }],
    ['backgroundFrom', { metric: 'LAeqLessLA90', backgroundFrom: '23:01', backgroundTo: '05:00' }],
    ['backgroundFrom', { backgroundFrom: '23:00', backgroundTo: '05:00' }],
    ['percent', { metric: 'LAeqLessLA90', percent: 50 }],
    ['threshold', { metric: 'eventCount', eventThreshold: 60, eventSeconds: 10, threshold: 5.5 }],
    ['threshold', { metric: 'tonalShare', threshold: 100 }],
    ['stepMinutes', { metric: 'tonalShare', window: '1h', stepMinutes: 15 }],
  ];
  for (const [field, changes] of refused) {
    const body = { ...limit, ...changes };
    const answer = await callApi('POST', '/api/v1/networks/metrics/limits', { session: operator, body });
    expect(answer.status, JSON.stringify(changes)).toBe(422);
    const { fields } = (await answer.json()) as { fields: { field: string }[] };
    expect(fields.map((one) => one.field)).toContain(field);
  }
});

test('a limit on events is told in events', async () => {
  const body = {
    name: 'Night events',
    metric: 'eventCount',
    window: 'night',
    eventThreshold: 60,
    eventSeconds: 60,
    threshold: 10,
  };
  const set = await callApi('POST', '/api/v1/networks/metrics/limits', { session: operator, body });
  expect(await set.json()).toMatchObject({
    limit: {
      unit: 'events',
      descriptor: 'number of events above LAeq 60.0 dB within the night',
      threshold: 10,
    },
  });
});
