import { beforeAll, expect, test } from 'vitest';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Statistics } from '#lib/contracts/levels';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { expectSameLevel, makeDesk, sec, type Desk } from './support/desk';
import { expectBroadband, expectOctave, expectThird } from './support/expectSecondPath';
import { invent, storeMeasured } from './support/measured';
import { bandLeq, bandSamples, exceeded } from './support/secondPath';

/** A monitor that is set up anew: other thirds within a quarter-hour, and octaves in place of thirds. */
const DAY_SEC = sec('2026-02-10T00:00:00Z');
const CHANGE_SEC = DAY_SEC + 11 * 3600 + 420;
const END_SEC = DAY_SEC + 86_400;

useFreshSchema();

let desk: Desk;

beforeAll(async () => {
  desk = await makeDesk('band-sets');
});

async function measure(
  code: string,
  before: { bands: [number, number]; fraction: 1 | 3 },
  after: { bands: [number, number]; fraction: 1 | 3 },
): Promise<number> {
  const id = await makeStation(desk.networkId, code);
  const first = { fromSec: DAY_SEC, toSec: CHANGE_SEC, intervalSec: 60 };
  await storeMeasured(id, await invent({ ...first, ...before }, 21));
  const second = { fromSec: CHANGE_SEC, toSec: END_SEC, intervalSec: 60 };
  await storeMeasured(id, await invent({ ...second, ...after }, 22));
  await aggregateAll(async () => undefined);
  return id;
}

function read(code: string, fromSec: number, toSec: number): Promise<Statistics> {
  const period = { from: formatInstantUtc(fromSec), to: formatInstantUtc(toSec) };
  return desk.read<Statistics>(code, 'statistics', period);
}

test('other thirds from some minute on: each band has the figures of its own seconds', async () => {
  const stationId = await measure(
    'THIRDS',
    { bands: [-16, 9], fraction: 3 },
    { bands: [-13, 11], fraction: 3 },
  );
  // On quarter-hours, the one of the change, ragged about it, and the whole day.
  for (const [fromSec, toSec] of [
    [DAY_SEC, END_SEC],
    [CHANGE_SEC - 420, CHANGE_SEC + 480],
    [CHANGE_SEC - 5000, CHANGE_SEC + 4321],
    [CHANGE_SEC - 7200, CHANGE_SEC],
  ] as const) {
    const figures = await read('THIRDS', fromSec, toSec);
    const asked = { stationId, fromSec, toSec };
    await expectBroadband(figures, asked, 'thirds');
    for (const index of [-16, -14, -13, 0, 9, 10, 11]) await expectThird(figures, asked, index, 'thirds');
    for (const index of [-15, -12, 0, 9]) await expectOctave(figures, asked, index, 'thirds');
  }
});

test('octaves in place of thirds: no band figures where both occur, each kind’s own where only it does', async () => {
  const stationId = await measure(
    'OCTAVES',
    { bands: [-16, 9], fraction: 3 },
    { bands: [-15, 9], fraction: 1 },
  );
  for (const [fromSec, toSec] of [
    [DAY_SEC, END_SEC],
    [CHANGE_SEC - 420, CHANGE_SEC + 480],
    [CHANGE_SEC - 5000, CHANGE_SEC + 4321],
  ] as const) {
    const mixed = await read('OCTAVES', fromSec, toSec);
    await expectBroadband(mixed, { stationId, fromSec, toSec }, 'mixed');
    for (const { Leq, L10, L90 } of [...mixed.bands, ...mixed.octaves]) {
      expect([Leq, L10, L90]).toEqual([null, null, null]);
    }
  }
  const before = { stationId, fromSec: DAY_SEC + 3600, toSec: CHANGE_SEC };
  await expectThird(await read('OCTAVES', before.fromSec, before.toSec), before, 0, 'before');

  const after = { stationId, fromSec: CHANGE_SEC, toSec: END_SEC };
  const octaves = await read('OCTAVES', after.fromSec, after.toSec);
  const octave = octaves.octaves.find(({ nominalHz }) => nominalHz === 1000);
  expectSameLevel(octave?.Leq, await bandLeq(after, 0), 'octave');
  expect(octave?.L90).toBe(exceeded(await bandSamples(after, 0), 90, 60));
});
