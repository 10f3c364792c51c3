import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { findStation, type StationRow } from '#db/queries/stations';
import { readRatingEntry } from '#lib/services/figures/ratingForm';
import { figureSheet } from '#lib/services/figures/sheet';
import { at, storeMinutes } from '../complaints/support';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';
import { roleSessions, type Sessions } from './support';

useFreshSchema();

const PATH = '/api/v1/networks/merrow/stations/MER-01';
const [from, moved, to] = ['2026-03-02T10:00:00Z', '2026-03-02T10:30:00Z', '2026-03-02T11:00:00Z'];
let networkId: number;
let sessions: Sessions;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  sessions = await roleSessions(networkId, await makeNetwork('farther'));
  const id = await makeStation(networkId, 'MER-01');
  await storeMinutes(id, at(from), at(to), (startSec) => ({
    laeqCentiDb: startSec < at(moved) ? 6000 : 6300,
  }));
});

async function station(): Promise<StationRow> {
  const found = await findStation(networkId, 'MER-01');
  if (!found) throw new Error('There is no MER-01.');
  return found;
}

const change = (body: object, session = sessions.operator) => callApi('PATCH', PATH, { session, body });

async function statistics(begin: string, end: string) {
  const answer = await callApi('GET', `${PATH}/statistics?from=${begin}&to=${end}`, {
    session: sessions.regulator,
  });
  return (await answer.json()) as {
    LAeq: number;
    incident: { LAeq: number; placements: { placement: string; correction: number; to: string }[] };
  };
}

test('a façade’s correction holds from its date on and is told with the figure; what was measured stays', async () => {
  expect((await statistics(from, to)).incident.placements).toMatchObject([{ correction: 0 }]);
  const answer = await change({ placement: 'facade', placementFrom: moved });
  expect(await answer.json()).toMatchObject({ station: { placement: 'facade', facadeCorrection: 3 } });

  const before = await statistics(from, moved);
  expect([before.LAeq, before.incident.LAeq]).toEqual([60, 60]);
  const after = await statistics(moved, to);
  expect([after.LAeq, after.incident.LAeq]).toEqual([63, 60]);
  const both = await statistics(from, to);
  expect(both.LAeq).toBeCloseTo(61.75, 2);
  expect(both.incident.LAeq).toBeCloseTo(60, 6);
  expect(both.incident.placements).toMatchObject([
    { placement: 'free-field', correction: 0, to: moved },
    { placement: 'facade', correction: -3, to },
  ]);
});

test('the sheet of figures says the correction, and when it began', async () => {
  const sheet = await figureSheet({
    networkSlug: 'merrow',
    station: await station(),
    fromSec: at(from),
    toSec: at(to),
    rating: readRatingEntry(new URLSearchParams()),
    nowSec: at(to),
  });
  const row = sheet.levels.find(({ key }) => key === 'LAeqIncident');
  expect(row?.convention).toMatch(/0\.0 dB until .*10:30, then −3\.0 dB/);
  expect(sheet.head.find(({ name }) => name === 'Place')?.words).toMatch(/free field until .*at a façade/);
});

test('a change may not lie in the future or before the latest one, and stands in the audit trail', async () => {
  for (const placementFrom of ['2099-01-01T00:00:00Z', from]) {
    const refused = await change({ facadeCorrection: 2.5, placementFrom });
    expect(refused.status).toBe(422);
    expect(JSON.stringify(await refused.json())).toContain('placementFrom');
  }
  expect((await change({ facadeCorrection: 7 })).status).toBe(422);
  expect((await change({ facadeCorrection: 2.5 }, sessions.regulator)).status).toBe(403);
  expect((await change({ facadeCorrection: 2.5, placementFrom: moved })).status).toBe(200);
  expect((await statistics(moved, to)).incident.LAeq).toBeCloseTo(60.5, 6);
  const entries = await db()('audit_log').where({ action: 'station.change' }).orderBy('id').pluck('detail');
  expect(entries).toMatchObject([
    { before: { placement: 'free-field' }, after: { placement: 'facade' }, placementFrom: moved },
    { after: { facadeCorrectionDb: 2.5 }, placementFrom: moved },
  ]);
});
