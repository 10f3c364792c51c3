import { expect, test } from 'vitest';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Statistics } from '#lib/contracts/levels';
import { type UsualLevels } from '#lib/contracts/usual';
import { expectSameLevel, makeDesk, sec } from '../levels/support/desk';
import { invent, storeMeasured } from '../levels/support/measured';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';

useFreshSchema();

const WEEK_SEC = 7 * 86_400;
/** A Tuesday; three of the eight weeks before have data. */
const FROM_SEC = sec('2026-03-17T10:00:00Z');
const PERIOD = { fromSec: FROM_SEC, toSec: FROM_SEC + 3600 };
const query = (weeks: number) => ({
  from: formatInstantUtc(PERIOD.fromSec - weeks * WEEK_SEC),
  to: formatInstantUtc(PERIOD.toSec - weeks * WEEK_SEC),
});

test('the usual spectrum is the median of each band over the weeks that count', async () => {
  const desk = await makeDesk('usual-bands');
  const stationId = await makeStation(desk.networkId, 'MER-01');
  for (const week of [1, 2, 5]) {
    const fromSec = FROM_SEC - week * WEEK_SEC;
    const stretch = {
      fromSec,
      toSec: fromSec + 3600,
      intervalSec: 60,
      gaps: 0,
      bands: [-16, 9] as [number, number],
    };
    // Flags and wind would leave some of it out, and a week out of the count.
    const calm = (await invent(stretch, week)).map((one) => ({ ...one, flags: 0, windSpeedMs: 1 }));
    await storeMeasured(stationId, calm);
  }
  await aggregateAll(async () => undefined);

  const usual = await desk.read<UsualLevels>('MER-01', 'usual', query(0));
  expect(usual).toMatchObject({ weeks: 8, validWeeks: 3 });
  const weeks = [];
  for (const week of [1, 2, 5]) weeks.push(await desk.read<Statistics>('MER-01', 'statistics', query(week)));
  for (const of of ['bands', 'octaves'] as const) {
    expect(usual[of].length).toBe(of === 'bands' ? 26 : 8);
    for (const { nominalHz, median } of usual[of]) {
      const levels = weeks.flatMap((one) => one[of].find((band) => band.nominalHz === nominalHz)?.Leq ?? []);
      expectSameLevel(median, levels.toSorted((a, b) => a - b)[1] ?? null, `${of} ${nominalHz} Hz`);
    }
  }
});

test('where no week counts there is no usual spectrum', async () => {
  const desk = await makeDesk('usual-none');
  await makeStation(desk.networkId, 'MER-01');
  const usual = await desk.read<UsualLevels>('MER-01', 'usual', query(0));
  expect(usual).toMatchObject({ validWeeks: 0, bands: [], octaves: [] });
});
