import { beforeAll, expect, test } from 'vitest';
import { findNetworkById } from '#db/queries/networks';
import { findStation, type StationRow } from '#db/queries/stations';
import { readRatingEntry } from '#lib/services/figures/ratingForm';
import { figureSheet } from '#lib/services/figures/sheet';
import { computeMonth } from '#lib/services/summaries/document/computeMonth';
import { at, storeMinutes } from '../complaints/support';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const base = '/api/v1/networks/merrow';
const [from, swapped, to] = ['2026-03-02T10:00:00Z', '2026-03-02T10:30:00Z', '2026-03-02T11:00:00Z'];
let networkId: number;
let session: string;
let station: StationRow;

const post = async (path: string, body: object) => {
  const answer = await callApi('POST', `${base}/${path}`, { session, body });
  expect(answer.status, await answer.clone().text()).toBe(201);
  return (await answer.json()) as Record<string, { id: number }>;
};

async function addInstrument(serialNumber: string, instrumentClass: 1 | 2, checks: [string, number][]) {
  const body = { serialNumber, class: instrumentClass, description: 'Logger', microphone: '' };
  const id = (await post('instruments', body))['instrument']?.id ?? 0;
  for (const [checkedAt, before] of checks) {
    await post('calibrations', {
      instrument: id,
      checkedAt,
      calibratorLevel: 94,
      before,
      checkedBy: 'A. Field',
    });
  }
  return id;
}

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  session = (await makePerson(networkId, ['operator'])).session;
  const id = await makeStation(networkId, 'MER-01');
  await storeMinutes(id, at(from), at(to), () => ({ laeqCentiDb: 6000 }));
  const found = await findStation(networkId, 'MER-01');
  if (!found) throw new Error('There is no MER-01.');
  station = found;
  const first = await addInstrument('A-1', 1, [
    ['2026-02-01T09:00:00Z', 94.1],
    ['2026-03-02T10:40:00Z', 99],
  ]);
  const second = await addInstrument('B-2', 2, []);
  await post(`instruments/${first}/deployments`, {
    station: 'MER-01',
    from: '2026-02-01T10:00:00Z',
    to: swapped,
  });
  await post(`instruments/${second}/deployments`, { station: 'MER-01', from: swapped });
});

test('statistics name each instrument with its part of the period and its latest check before that part’s end', async () => {
  const answer = await callApi('GET', `${base}/stations/MER-01/statistics?from=${from}&to=${to}`, {
    session,
  });
  const { instruments } = (await answer.json()) as { instruments: object[] };
  expect(instruments).toMatchObject([
    {
      serialNumber: 'A-1',
      class: 1,
      from,
      to: swapped,
      lastCheck: { at: '2026-02-01T09:00:00Z', drift: 0.1, isWithinBound: true },
    },
    { serialNumber: 'B-2', class: 2, from: swapped, to, lastCheck: null },
  ]);
});

test('so do the sheet of figures and the month', async () => {
  const period = { fromSec: at(from), toSec: at(to) };
  const rating = readRatingEntry(new URLSearchParams());
  const sheet = await figureSheet({ networkSlug: 'merrow', station, ...period, rating, nowSec: at(to) });
  expect(sheet.head.find(({ name }) => name === 'Instrument')?.words).toMatch(
    /class 1, serial number A-1, last checked .*1 February 2026 \(\+0\.1 dB\); then .*B-2, no check on record before/,
  );
  const network = await findNetworkById(networkId);
  if (!network) throw new Error('The network is gone.');
  const month = await computeMonth(network, '2026-03', new Date('2026-04-02T00:00:00Z'));
  expect(month.stations[0]).toMatchObject({
    instruments: [{ serialNumber: 'A-1', from: '2026-03-01T00:00:00Z' }, { serialNumber: 'B-2' }],
    placements: [{ placement: 'free-field', correction: 0 }],
  });
});
