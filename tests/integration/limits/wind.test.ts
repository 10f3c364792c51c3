import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { pool } from '#db/queries/connection';
import { listSettings } from '#db/queries/networks';
import { findStationById, type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { describeChange } from '#ingest/notify/describeChange';
import type { WindRule } from '#lib/acoustics/windRule';
import { WindowEvidence } from '#lib/services/limits/windowEvidence';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { judged, send } from './support';

useFreshSchema();

/** Tuesday 3 March 2026, midnight in London (GMT). */
const DAY_SEC = Date.parse('2026-03-03T00:00:00Z') / 1000;
const HOUR = { fromSec: DAY_SEC + 10 * 3600, toSec: DAY_SEC + 11 * 3600 };
const NONE: WindRule = {
  minimumMs: null,
  maximumMs: null,
  fromDeg: null,
  toDeg: null,
  dismissAboveMs: null,
  unknown: 'left-out',
};

let station: StationRow;
let session: string;

/** Quarters of an hour: 50 dB with 2 m/s from north, 60 dB with 4 m/s from south, 70 dB with an unknown wind, 80 dB above the network's bound. */
const QUARTERS = [
  { LAeq: 50, windSpeed: 2, windDirection: 350 },
  { LAeq: 60, windSpeed: 4, windDirection: 180 },
  { LAeq: 70 },
  { LAeq: 80, windSpeed: 7, windDirection: 0 },
];

beforeAll(async () => {
  const networkId = await makeNetwork('wind');
  const found = await findStationById(await makeStation(networkId, 'WD-1'));
  if (!found) throw new Error('No station.');
  station = found;
  ({ session } = await makePerson(networkId, ['operator']));
  const minutes = QUARTERS.flatMap((quarter) => new Array<typeof quarter>(15).fill(quarter));
  await send(
    station.id,
    HOUR.fromSec,
    minutes.map((minute) => ({ ...minute, levels: [40] })),
  );
  await aggregateAll(async () => undefined);
});

async function measured(rule: Partial<WindRule>) {
  const timeline = await listSettings(station.networkId);
  const evidence = new WindowEvidence({ station, timeline, validity: 'rules' }, pool());
  const laeq = { metric: 'LAeq', bandFraction: null, bandIndex: null, minimumCoverage: null } as const;
  return evidence.measure({ ...laeq, windRule: { ...NONE, ...rule } }, HOUR);
}

const meanDb = (...levels: number[]) =>
  10 * Math.log10(levels.reduce((sum, db) => sum + 10 ** (db / 10), 0) / levels.length);

test.each<[what: string, rule: Partial<WindRule>, levelDb: number, quarters: number]>([
  ['at most 3 m/s', { maximumMs: 3 }, 50, 1],
  ['at least 3 m/s: the network’s bound holds beside it', { minimumMs: 3 }, 60, 1],
  ['at most 3 m/s, what is unknown counts', { maximumMs: 3, unknown: 'counts' }, meanDb(50, 70), 2],
  ['from a sector across north', { fromDeg: 315, toDeg: 45 }, 50, 1],
  ['nothing but a dismissal leaves none out', { dismissAboveMs: 9 }, meanDb(50, 60, 70), 3],
])('intervals that count: %s', async (_, rule, levelDb, quarters) => {
  const found = await measured(rule);
  expect(found.levelDb).toBeCloseTo(levelDb, 6);
  expect(found.validSec).toBe(quarters * 900);
});

test('the mean wind that dismisses is that of everything measured: (2 + 4 + 7) / 3 m/s', async () => {
  expect(await measured({ dismissAboveMs: 4.2 })).toMatchObject({ isDismissed: true });
  expect(await measured({ dismissAboveMs: 4.3 })).toMatchObject({ isDismissed: false });
});

async function put(path: string, body: object, status: number) {
  const answer = await callApi('POST', `/api/v1/networks/wind/limits${path}`, { session, body });
  const json = await answer.json();
  expect(answer.status, JSON.stringify(json)).toBe(status);
  return json as { limit: { id: number } };
}

test('a rule is a version of its limit: it lifts what it dismisses, is told in the e-mail, and stands at the exceedance', async () => {
  const limit = { name: 'Calm', metric: 'LAeq', window: '1h', threshold: 55, minimumCoverage: 0.2 };
  const effectiveFrom = '2026-03-01T00:00:00Z';
  const calm = { ...limit, windMaximum: 4.5, effectiveFrom };
  const { limit: set } = await put('', calm, 201);
  expect(set).toMatchObject({ windMaximum: 4.5, windMinimum: null, windUnknown: 'left-out' });
  const [found] = await judged();
  if (!found) throw new Error('Nothing was found.');
  expect(found.verdict.levelDb).toBeCloseTo(meanDb(50, 60), 6);
  const facts = new Map(describeChange(found, 'wind').facts);
  expect(facts.get('Its wind rule')).toBe(
    'only wind of at most 4.5 m/s counts; intervals with unknown wind do not count',
  );
  const at = `/api/v1/networks/wind/exceedances/${found.exceedanceId}`;
  const { exceedance } = await (await callApi('GET', at, { session })).json();
  expect(exceedance).toMatchObject({
    coverage: 0.5,
    limitThen: { windMaximum: 4.5 },
    limitWind: { meanSpeed: 13 / 3, secondsWithin: 1800, secondsOutside: 900, secondsUnknown: 900 },
  });
  await put(`/${set.id}/versions`, { ...calm, windDismissAbove: 4, reason: 'Gusts' }, 201);
  expect((await judged()).map(({ kind }) => kind)).toEqual(['lifted']);
  expect(await db()('exceedances').pluck('state')).toEqual(['lifted']);
});

test('a trial counts what the wind dismisses', async () => {
  const limit = { name: 'Trial', metric: 'LAeq', window: '1h', threshold: 55, windDismissAbove: 4 };
  const body = { limit, from: '2026-03-03', to: '2026-03-04' };
  const answer = await callApi('POST', '/api/v1/networks/wind/limits/trial', { session, body });
  expect(await answer.json()).toMatchObject({
    trial: {
      windWords:
        'not compared when the mean wind is above 4.0 m/s; windows with less than half of it known are not compared',
      counts: { windows: 24, empty: 23, dismissed: 1, compared: 0, caught: 0 },
    },
  });
});

test('half a sector, an upside-down range and fractions of a degree are refused', async () => {
  const limit = { name: 'Any', metric: 'LAeq', window: '1h', threshold: 55 };
  const refused: [field: string, changes: object][] = [
    ['windTo', { windFrom: 10 }],
    ['windMaximum', { windMinimum: 5, windMaximum: 4 }],
    ['windFrom', { windFrom: 10.5, windTo: 20 }],
    ['windUnknown', { windMaximum: 5, windUnknown: 'perhaps' }],
  ];
  for (const [field, changes] of refused) {
    const answer = await put('', { ...limit, ...changes }, 422);
    expect(answer).toMatchObject({ fields: [{ field }] });
  }
});
