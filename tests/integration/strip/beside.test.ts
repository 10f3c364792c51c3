import { beforeAll, describe, expect, test } from 'vitest';
import { findStation, type StationRow } from '#db/queries/stations';
import { readBeside } from '#lib/services/strip/beside';
import { stripTrack } from '#lib/services/strip/track';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

useFreshSchema();

const zone = 'Europe/London';
const at = (text: string) => Date.parse(text) / 1000;
/** November 2026, local. */
const period = { fromSec: at('2026-11-01T00:00:00Z'), toSec: at('2026-12-01T00:00:00Z') };
let station: StationRow;

beforeAll(async () => {
  const networkId = await makeNetwork('merrow');
  await makeStation(networkId, 'MER-01');
  await makeStation(networkId, 'MER-03', { intervalSec: 1, bandFraction: 1, firstBandIndex: -15 });
  await makeStation(await makeNetwork('farther'), 'FAR-01');
  const found = await findStation(networkId, 'MER-01');
  if (!found) throw new Error('The station is there.');
  station = found;
});

const read = (query: string) => readBeside({ station, period, zone, params: new URLSearchParams(query) });

describe('what stands under a strip', () => {
  test('nothing, unless something else is asked for', async () => {
    for (const query of ['', 'with=&against=', 'with=MER-01', 'against=2026-11']) {
      expect(await read(query)).toEqual({ beside: null, problem: null });
    }
  });

  test('another station of the network, in the same period', async () => {
    const { beside } = await read('with=MER-03');
    expect(beside).toMatchObject({ station: { code: 'MER-03' }, shiftSec: 0 });
    if (!beside) return;
    const track = await stripTrack(beside.station, period, beside.shiftSec);
    expect(track.station).toMatchObject({ code: 'MER-03', bandFraction: 1, intervalSec: 1 });
  });

  test('another period from its beginning, over a clock change too', async () => {
    const shift = async (query: string) => (await read(query)).beside?.shiftSec;
    // October begins in summer time, an hour earlier by the sun.
    expect(await shift('against=2026-10')).toBe(-(31 * 86_400) - 3600);
    expect(await shift('against=2026-10-30')).toBe(-2 * 86_400);
    expect(await shift('against=2026-10-31T12:00:00Z')).toBe(-43_200);
    expect(await shift('with=MER-03&against=2026-12-01')).toBe(30 * 86_400);
  });

  test('a wrong period is told, and a station of another network as one that does not exist', async () => {
    expect((await read('against=October')).problem).toContain('could not be read');
    const [foreign, none] = await Promise.all([read('with=FAR-01'), read('with=NIX-01')]);
    expect(foreign).toEqual({
      beside: null,
      problem: 'The network has no station FAR-01 to show beside this one.',
    });
    expect(none.problem).toBe(foreign.problem?.replace('FAR-01', 'NIX-01'));
  });
});
