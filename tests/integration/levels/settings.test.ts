import fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import { findNetworkById } from '#db/queries/networks';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { changeNetwork } from '#lib/services/networks/change';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { makeDesk, sec, type Desk } from './support/desk';
import { invent, storeMeasured } from './support/measured';
import { computedRows } from './support/tables';
import { rebuildAll } from './support/rebuildAll';

/** Settings that reach back: what follows from the marks they leave is what a rebuild of everything gives, no row more or less. */
const FIRST_SEC = sec('2025-10-23T05:00:00Z');
const END_SEC = sec('2025-10-28T12:00:00Z');

useFreshSchema();

let desk: Desk;
let stationId: number;

beforeAll(async () => {
  desk = await makeDesk('settings');
  stationId = await makeStation(desk.networkId, 'SETTINGS', { intervalSec: 300 });
  const stretch = { fromSec: FIRST_SEC + 120, toSec: END_SEC, intervalSec: 300 };
  await storeMeasured(stationId, await invent({ ...stretch, bands: [-3, 0] }, 41));
  await aggregateAll(async () => undefined);
});

const aChange = fc.record({
  effectiveFrom: fc.integer({ min: FIRST_SEC - 86_400, max: END_SEC }),
  timeZone: fc.constantFrom('Europe/London', 'Europe/Athens', 'America/New_York', 'Pacific/Auckland'),
  periods: fc.constantFrom(
    { day: 420, evening: 1140, night: 1380 },
    { day: 360, evening: 1080, night: 1320 },
    { day: 420, evening: null, night: 1320 },
    { day: 365, evening: 1145, night: 1385 },
  ),
  maximumWindSpeed: fc.constantFrom(3, 5),
  excludeRain: fc.boolean(),
});

test('rows after changed zones, periods and rules are those of a rebuild', async () => {
  await fc.assert(
    fc.asyncProperty(aChange, async (change) => {
      const network = await findNetworkById(desk.networkId);
      if (!network) throw new Error('The network is not there.');
      await changeNetwork(network, change, desk.userId);
      await aggregateAll(async () => undefined);
      const followed = await computedRows(stationId);
      await rebuildAll(async () => undefined);
      expect(followed).toEqual(await computedRows(stationId));
    }),
    { numRuns: 12, seed: 20_251_026, endOnFailure: true },
  );
});
