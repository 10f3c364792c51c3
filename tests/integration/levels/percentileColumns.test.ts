import { beforeAll, expect, test } from 'vitest';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Statistics } from '#lib/contracts/levels';
import { type Spectrogram } from '#lib/contracts/spectrogram';
import { decodeSpectrogram, encodeSpectrogram } from '#lib/contracts/spectrogramBinary';
import { findStation } from '#db/queries/stations';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { makeDesk, sec, type Desk } from './support/desk';
import { invent, storeMeasured } from './support/measured';

/** LA10, LA50 and LA90 beside a spectrogram's columns against `…/statistics` of the same blocks of UTC. */
const FROM = sec('2026-04-01T00:00:00Z');
const bands: [number, number] = [-4, 4];

useFreshSchema();

let desk: Desk;

beforeAll(async () => {
  desk = await makeDesk('blocks');
  const minutes = await makeStation(desk.networkId, 'MINUTES');
  const measured = await invent({ fromSec: FROM, toSec: FROM + 16 * 86_400, intervalSec: 60, bands }, 5);
  const isLate = (startSec: number) => startSec >= FROM + 7200 && startSec < FROM + 9000;
  await storeMeasured(
    minutes,
    measured.filter(({ startSec }) => !isLate(startSec)),
  );
  const few = await makeStation(desk.networkId, 'HOURS');
  await storeMeasured(
    few,
    await invent({ fromSec: FROM, toSec: FROM + 86_400, intervalSec: 3600, bands, gaps: 0 }, 6),
  );
  await aggregateAll(async () => undefined);
  // What came late waits for recomputation: it must be in the levels all the same.
  await storeMeasured(
    minutes,
    measured.filter(({ startSec }) => isLate(startSec)),
  );
}, 120_000);

function columns(code: string, fromSec: number, toSec: number, most: number): Promise<Spectrogram> {
  const period = { from: formatInstantUtc(fromSec), to: formatInstantUtc(toSec) };
  return desk.read(code, 'spectrogram', { ...period, columns: String(most), percentiles: 'A' });
}

async function blockLevels(fromSec: number, toSec: number): Promise<(number | null | undefined)[]> {
  const { LAN } = await desk.read<Statistics>('MINUTES', 'statistics', {
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
  });
  return [LAN['10'], LAN['50'], LAN['90']];
}

test('columns finer than a block have the levels of the hour that they begin in', async () => {
  const held = await columns('MINUTES', FROM + 5400, FROM + 5400 + 7200, 4000);
  expect([held.source, held.stepSeconds, held.percentiles?.seconds]).toEqual(['intervals', 60, 3600]);
  for (const [hour, at] of [
    [1, 0],
    [2, 30],
    [2, 89],
    [3, 90],
  ] as const) {
    const told = held.percentiles && [
      held.percentiles.LA10[at],
      held.percentiles.LA50[at],
      held.percentiles.LA90[at],
    ];
    expect(told, `column ${at}`).toEqual(await blockLevels(FROM + hour * 3600, FROM + (hour + 1) * 3600));
  }
});

test('columns of quarter-hours have the levels of a block that is no shorter', async () => {
  const held = await columns('MINUTES', FROM, FROM + 16 * 86_400, 200);
  expect([held.source, held.stepSeconds, held.percentiles?.seconds]).toEqual(['quarter-hours', 7200, 7200]);
  const at = 37;
  const told = held.percentiles && [
    held.percentiles.LA10[at],
    held.percentiles.LA50[at],
    held.percentiles.LA90[at],
  ];
  expect(told).toEqual(await blockLevels(FROM + at * 7200, FROM + (at + 1) * 7200));
});

test('too few samples have none, and unasked there are none', async () => {
  const few = await columns('HOURS', FROM, FROM + 86_400, 24);
  expect(few.percentiles?.LA90.every((level) => level === null)).toBe(true);
  expect(few.LAeq.some((level) => level !== null)).toBe(true);
  const period = { from: formatInstantUtc(FROM), to: formatInstantUtc(FROM + 3600) };
  expect((await desk.read<Spectrogram>('MINUTES', 'spectrogram', period)).percentiles).toBeNull();
});

test('the bytes hold the same', async () => {
  const station = await findStation(desk.networkId, 'MINUTES');
  if (!station) throw new Error('The station is gone.');
  const query = { station, fromSec: FROM, toSec: FROM + 7200, mostColumns: 4000 };
  const held = await spectrogram({ ...query, percentiles: true });
  expect(decodeSpectrogram(encodeSpectrogram(held).buffer).percentiles).toEqual(held.percentiles);
  expect(held.percentiles?.la50CentiDb[70]).toBeGreaterThan(0);
  expect(decodeSpectrogram(encodeSpectrogram(await spectrogram(query)).buffer).percentiles).toBeNull();
});
