import { expect, test } from 'vitest';
import { bandRange } from '#lib/acoustics/bands';
import { toTenths } from '#lib/acoustics/rounding';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Statistics } from '#lib/contracts/levels';
import { useFreshSchema } from '../integration/support/freshSchema';
import { expectNear, present, readCsv } from './support/fixtures';
import { PostedNetwork } from './support/postedStation';

useFreshSchema();

test('measured rural thirds of one second, 20 minutes (fixtures/open-data, NPS): LAeq 50.47, L10, L50, L90', async () => {
  const [header, ...rows] = readCsv('open-data/nps_rivendell_thirds_1s.csv.gz');
  expect(present(header).slice(1, -1)).toEqual(
    bandRange(3, 25, 8000).map(({ nominalHz }) => `z${nominalHz}`),
  );
  const startSec = Date.parse('2021-06-23T11:36:02Z') / 1000;
  const records = rows.map((cells, at) => ({
    start: formatInstantUtc(startSec + at),
    seconds: 1,
    LAeq: Number(cells.at(-1)),
    levels: cells.slice(1, -1).map(Number),
  }));
  const network = await PostedNetwork.make();
  await network.post('RURAL', 25, 8000, records);
  const figures = await network.get<Statistics>('RURAL', 'statistics', {
    from: formatInstantUtc(startSec),
    to: formatInstantUtc(startSec + 1200),
  });
  expect(figures.seconds).toEqual({ expected: 1200, valid: 1200, excluded: 0 });
  expectNear(figures.LAeq, 50.47, 0.01, 'LAeq');
  // The set's own percentiles, not rounded to tenths.
  const percentilesDb = [54.8981, 47.0506, 44.165].map((levelDb) => toTenths(levelDb) / 10);
  expect([figures.LAN['10'], figures.LAN['50'], figures.LAN['90']]).toEqual(percentilesDb);
  expect(figures.sampleSeconds).toBe(1);
});
