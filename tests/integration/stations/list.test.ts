import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { stationList } from '#lib/services/stations/stationList';
import { stationListCsv } from '#lib/services/stations/listCsv';
import { readStationList } from '../../../src/components/stations/listView';
import { at, storeMinutes } from '../complaints/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

useFreshSchema();

const period = { fromSec: at('2026-03-02T10:00:00Z'), toSec: at('2026-03-02T11:00:00Z') };
let networkId: number;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  await makeStation(await makeNetwork('farther'), 'FAR-01');
  const levels = { 'MER-2': 5234, 'MER-10': 6101, 'MER-3': null };
  for (const [code, laeqCentiDb] of Object.entries(levels)) {
    const id = await makeStation(networkId, code, { surroundings: code === 'MER-3' ? 'Quay wall' : '' });
    if (laeqCentiDb === null) await addTrouble(id);
    else await storeMinutes(id, period.fromSec, period.toSec, () => ({ laeqCentiDb }));
  }
  const gone = await makeStation(networkId, 'MER-9', { name: '=Gone, "old"' });
  await db()('stations').where({ id: gone }).update({ retired_at: new Date() });
});

const addTrouble = (stationId: number) =>
  db()('health_troubles').insert({
    network_id: networkId,
    station_id: stationId,
    kind: 'battery',
    begins_at: period.fromSec,
    noticed_at: new Date(),
  });

async function listed(query: string) {
  const choice = readStationList(new URL(`http://127.0.0.1/n/merrow/stations?${query}`));
  const list = await stationList(networkId, period, choice);
  return { ...list, choice, codes: list.rows.map(({ station }) => station.code) };
}

test('is narrowed by text, state and health, and is of this network alone', async () => {
  expect((await listed('')).codes).toEqual(['MER-2', 'MER-3', 'MER-10']);
  expect((await listed('text=QUAY')).codes).toEqual(['MER-3']);
  expect((await listed('state=retired')).codes).toEqual(['MER-9']);
  expect((await listed('state=all')).codes).toHaveLength(4);
  expect((await listed('health=trouble')).codes).toEqual(['MER-3']);
  expect((await listed('health=battery')).codes).toEqual(['MER-3']);
  expect((await listed('health=fine')).codes).toEqual(['MER-2', 'MER-10']);
  expect((await listed('state=sunk&health=odd&sort=colour')).codes).toHaveLength(3);
  expect((await listed('')).counts).toEqual({ live: 0, silent: 0, awaiting: 3, retired: 1 });
});

test('is sorted both ways; a station without the value comes last either way', async () => {
  expect((await listed('sort=laeq')).codes).toEqual(['MER-2', 'MER-10', 'MER-3']);
  expect((await listed('sort=-laeq')).codes).toEqual(['MER-10', 'MER-2', 'MER-3']);
  expect((await listed('sort=-station')).codes).toEqual(['MER-10', 'MER-3', 'MER-2']);
});

test('the file has the columns and the order of the list, with the period', async () => {
  const { rows, choice } = await listed('state=all&sort=-laeq&column=coverage&column=laeq');
  expect(stationListCsv(rows, choice.columns, period).split('\r\n')).toEqual([
    'Code,Station,LAeq (dB),Coverage,From,To',
    'MER-10,Station MER-10,61,1,2026-03-02T10:00:00Z,2026-03-02T11:00:00Z',
    'MER-2,Station MER-2,52.3,1,2026-03-02T10:00:00Z,2026-03-02T11:00:00Z',
    'MER-3,Station MER-3,,0,2026-03-02T10:00:00Z,2026-03-02T11:00:00Z',
    'MER-9,"\'=Gone, ""old""",,0,2026-03-02T10:00:00Z,2026-03-02T11:00:00Z',
    '',
  ]);
});
