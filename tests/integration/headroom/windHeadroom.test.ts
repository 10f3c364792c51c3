import { beforeEach, expect, test } from 'vitest';
import { inTransaction, pool } from '#db/queries/connection';
import { insertLimit, type NewLimitVersion } from '#db/queries/limits';
import { listSettings } from '#db/queries/networks';
import { findStationById, type StationRow } from '#db/queries/stations';
import type { WindRule } from '#lib/acoustics/windRule';
import type { LimitHeadroom } from '#lib/contracts/headroom';
import { stationHeadroom } from '#lib/services/headroom/headroom';
import { WindowEvidence } from '#lib/services/limits/windowEvidence';
import { send, type Sent } from '../limits/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

useFreshSchema();

const HOUR = {
  fromSec: Date.parse('2026-03-03T10:00:00Z') / 1000,
  toSec: Date.parse('2026-03-03T11:00:00Z') / 1000,
};
const RULE: WindRule = {
  minimumMs: 1,
  maximumMs: 4,
  fromDeg: 90,
  toDeg: 270,
  dismissAboveMs: null,
  unknown: 'left-out',
};
const LIMIT_DB = 60;
let networks = 0;
let station: StationRow;

beforeEach(async () => {
  networks += 1;
  const networkId = await makeNetwork(`wind-headroom-${networks}`);
  const found = await findStationById(await makeStation(networkId, 'WH-1'));
  if (!found) throw new Error('No station.');
  station = found;
});

async function limit(changes: Partial<NewLimitVersion> = {}): Promise<NewLimitVersion> {
  const fields: NewLimitVersion = {
    effectiveFromSec: 0,
    name: 'Test',
    metric: 'LAeq',
    averaging: '1h',
    bandFraction: null,
    bandIndex: null,
    thresholdTenths: LIMIT_DB * 10,
    weekdays: 127,
    fromMin: null,
    toMin: null,
    minimumCoverage: 0.5,
    stationIds: null,
    recipients: [],
    reason: '',
    createdBy: null,
    windRule: RULE,
    ...changes,
  };
  await inTransaction((transaction) => insertLimit(station.networkId, fields, transaction));
  return fields;
}

const minute = (LAeq: number, windSpeed?: number, windDirection?: number): Sent => ({
  LAeq,
  LAFmax: LAeq + 5,
  ...(windSpeed !== undefined && { windSpeed }),
  ...(windDirection !== undefined && { windDirection }),
  levels: [LAeq - 3],
});

async function headroomAfter(minutes: number): Promise<LimitHeadroom> {
  const { items } = await stationHeadroom(station, HOUR.fromSec + minutes * 60);
  expect(items).toHaveLength(1);
  return items[0] as LimitHeadroom;
}

/** What the judge makes of the whole hour. */
async function judgedHour(fields: NewLimitVersion) {
  const timeline = await listSettings(station.networkId);
  const evidence = new WindowEvidence({ station, timeline, validity: 'rules' }, pool());
  return evidence.measure(fields, HOUR);
}

/** 12 min that count, 8 min too windy, 6 min from elsewhere, 4 min of an unknown wind; the others are very loud. */
const HALF_HOUR = [
  ...Array.from({ length: 12 }, (_, at) => minute(52 + (at % 5), 1 + (at % 4), 90 + 15 * at)),
  ...new Array<Sent>(8).fill(minute(75, 4.5, 180)),
  ...new Array<Sent>(6).fill(minute(78, 2, 300)),
  ...new Array<Sent>(4).fill(minute(80)),
];

test.each<[string, Partial<NewLimitVersion>, number]>([
  ['LAeq', {}, 0],
  ['a band', { metric: 'bandLeq', bandFraction: 3, bandIndex: -10 }, 3],
])(
  'if the rest stays at it, within the wind, the judge finds %s at the limit',
  async (_, changes, aboveBandDb) => {
    const fields = await limit(changes);
    await send(station.id, HOUR.fromSec, HALF_HOUR);
    const { state, headroom, seconds, windWords } = await headroomAfter(30);
    expect({ state, seconds }).toEqual({
      state: 'open',
      seconds: { valid: 720, missing: 1080, awaited: 0, left: 1800, needed: 1080 },
    });
    expect(windWords).toContain('from 90° clockwise to 270°');
    const rest = minute(Math.round(((headroom ?? NaN) + aboveBandDb) * 100) / 100, 3, 270);
    await send(station.id, HOUR.fromSec + 1800, new Array<Sent>(30).fill(rest));
    const { levelDb, validSec } = await judgedHour(fields);
    expect(validSec).toBe(720 + 1800);
    expect(Math.abs((levelDb ?? NaN) - LIMIT_DB)).toBeLessThanOrEqual(0.05);
  },
);

test('seconds that may still count decide whether coverage can become enough, to the second', async () => {
  await limit({ minimumCoverage: 42 / 60 });
  await send(station.id, HOUR.fromSec, HALF_HOUR);
  expect(await headroomAfter(30)).toMatchObject({ state: 'open', seconds: { needed: 1800 } });
  await send(station.id, HOUR.fromSec + 1800, [minute(50, 5, 180)]);
  expect(await headroomAfter(31)).toMatchObject({ state: 'not-compared', headroom: null });
});

test('loud wind that does not count makes nothing certain; what counts does', async () => {
  await limit();
  await send(station.id, HOUR.fromSec, new Array<Sent>(30).fill(minute(90, 5, 180)));
  expect(await headroomAfter(30)).toMatchObject({
    state: 'no-data',
    headroom: expect.closeTo(60, 9),
    heading: null,
  });
  await send(station.id, HOUR.fromSec + 1800, new Array<Sent>(5).fill(minute(71, 2, 180)));
  expect(await headroomAfter(35)).toMatchObject({ state: 'certain', headroom: null, usualHigh: null });
});

test('a window that a calm rest cannot save from its wind is told as dismissed, at the edge of tenths', async () => {
  await limit({
    windRule: { ...RULE, minimumMs: null, maximumMs: null, fromDeg: null, toDeg: null, dismissAboveMs: 2 },
  });
  // Half of the hour at 4.09 m/s and a calm rest have a mean of 2.045, which is 2.0 in tenths; one minute of 0.9 m/s makes it 2.06.
  await send(station.id, HOUR.fromSec, new Array<Sent>(30).fill(minute(50, 4.09)));
  expect(await headroomAfter(30)).toMatchObject({ state: 'open' });
  await send(station.id, HOUR.fromSec + 1800, [minute(50, 0.9)]);
  expect(await headroomAfter(31)).toMatchObject({
    state: 'dismissed',
    headroom: null,
    level: expect.closeTo(50, 6),
  });
});
