import { expect, test } from 'vitest';
import { findStation } from '#db/queries/stations';
import { plantCandidates } from '#lib/services/plants/candidates';
import { seedPeople } from '#ops/demo/people';
import { seedPlants } from '#ops/demo/plants';
import { STATION_SITES } from '#ops/standins/tiles/sites';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { hear } from './support/tones';

useFreshSchema();

test('the demo’s register names the silo fan at Silo Lane on a weekday night, the transformer on a Sunday', async () => {
  const { networkId } = await seedPeople('a password for the demo');
  expect(await seedPlants(14)).toMatch(/^6 plants, [1-9]\d? entries/);
  const site = STATION_SITES.find(({ code }) => code === 'MER-02');
  if (!site) throw new Error('There is no MER-02.');
  const { latitude, longitude } = site;
  const stationId = await makeStation(networkId, 'MER-02', { latitude, longitude });
  const station = await findStation(networkId, 'MER-02');
  if (!station) throw new Error('The station is not there.');
  const named = async (from: string) => {
    const period = { fromSec: Date.parse(from) / 1000, toSec: Date.parse(from) / 1000 + 3600 };
    await hear(stationId, { ...period, levelDb: 40, tone: { hz: (1480 / 60) * 4, aboveDb: 19 } });
    const { candidates } = await plantCandidates(station, period, period.toSec);
    return candidates.map(({ name }) => name);
  };
  expect((await named('2026-03-03T23:00:00Z')).slice(0, 2)).toEqual(['Grain silo fan', 'Quay transformer']);
  expect((await named('2026-03-08T12:00:00Z'))[0]).toBe('Quay transformer');
});
