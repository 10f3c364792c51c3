import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { networkMasts } from '#lib/services/weather/masts';
import { seedMast } from '#ops/demo/mast';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

test('the demo’s mast brings its past and is assigned to the stations without a sensor', async () => {
  const networkId = await makeNetwork('merrow');
  const { userId } = await makePerson(networkId, ['operator']);
  for (const code of ['MER-02', 'MER-03']) await makeStation(networkId, code);
  const directory = mkdtempSync(join(tmpdir(), 'mast-'));
  const nowSec = Math.floor(Date.now() / 1000);
  const count = await seedMast(networkId, userId, directory, { fromSec: nowSec - 86_400, nowSec });
  rmSync(directory, { recursive: true });
  expect(count).toBeGreaterThan(140);
  const [mast] = await networkMasts(networkId);
  expect(mast?.assignments.map(({ station }) => station)).toEqual(['MER-02', 'MER-03']);
  expect(mast?.last).toMatchObject({ seconds: 600 });
});
