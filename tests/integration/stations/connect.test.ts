import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { findStation, type StationRow } from '#db/queries/stations';
import { tokenOfForm } from '#lib/http/connectForm';
import { submitForm } from '#lib/http/forms';
import { registerFromForm } from '#lib/http/stationForm';
import { examplePost } from '#lib/services/stations/examplePost';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { postedForm, roleSessions, STATION_FORM, type Sessions } from './support';

useFreshSchema();

const STATION = '/api/v1/networks/merrow/stations/MER-01';
let networkId: number;
let operatorId: string;
let sessions: Sessions;
let station: StationRow;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  const elsewhere = await makeNetwork('farther');
  await makeStation(elsewhere, 'FAR-01');
  operatorId = (await makePerson(networkId, ['operator'])).userId;
  sessions = await roleSessions(networkId, elsewhere);
  await makeStation(networkId, 'MER-01');
  station = await stationOf('MER-01');
});

async function stationOf(code: string): Promise<StationRow> {
  const found = await findStation(networkId, code);
  if (!found) throw new Error(`There is no ${code}.`);
  return found;
}

const issue = async (label: string) => {
  const answer = await callApi('POST', `${STATION}/tokens`, { session: sessions.operator, body: { label } });
  expect(answer.status).toBe(201);
  return (await answer.json()) as { id: number; token: string };
};
const post = (token: string, of: StationRow, nowSec = Date.now() / 1000) =>
  callApi('POST', '/api/v1/intervals', { token, body: examplePost(of, nowSec) });

describe('a token', () => {
  test('works at once, beside others, and shows what it is called and when it was used', async () => {
    const [one, other] = [await issue('Logger 7'), await issue('Logger 8')];
    const nowSec = Math.floor(Date.now() / 1000);
    const first = await post(one.token, station, nowSec);
    expect(await first.json()).toMatchObject({ accepted: 1, known: 0, refused: [] });
    expect(await (await post(other.token, station, nowSec)).json()).toMatchObject({ accepted: 0, known: 1 });
    const list = await (await callApi('GET', `${STATION}/tokens`, { session: sessions.operator })).json();
    expect(list.items.slice(0, 2)).toMatchObject([
      { id: other.id, label: 'Logger 8', lastUsedAt: expect.any(String), revokedAt: null },
      { id: one.id, label: 'Logger 7', lastUsedAt: expect.any(String), revokedAt: null },
    ]);
  });

  test('is kept nowhere in the clear, the audit trail included', async () => {
    const { token } = await issue('secret');
    const rows = [...(await db()('station_tokens').select('*')), ...(await db()('audit_log').select('*'))];
    expect(JSON.stringify(rows)).toContain('station-token.make');
    expect(JSON.stringify(rows)).not.toContain(token.slice(3));
    const list = await callApi('GET', `${STATION}/tokens`, { session: sessions.operator });
    expect(await list.text()).not.toContain(token.slice(3));
  });

  test('is refused from the moment that it is revoked, others are not', async () => {
    const [old, next] = [await issue('old'), await issue('next')];
    const revoked = await callApi('DELETE', `${STATION}/tokens/${old.id}`, { session: sessions.operator });
    expect(revoked.status).toBe(204);
    expect((await post(old.token, station)).status).toBe(401);
    expect((await post(next.token, station)).status).toBe(200);
    const again = await callApi('DELETE', `${STATION}/tokens/${old.id}`, { session: sessions.operator });
    expect(again.status).toBe(404);
    expect(await findAuditBreak()).toBeNull();
  });

  test('may be made without a body, and refuses a name that is no text or too long', async () => {
    const call = (body?: unknown) =>
      callApi('POST', `${STATION}/tokens`, { session: sessions.operator, body });
    expect((await call()).status).toBe(201);
    expect((await call({ label: 7 })).status).toBe(422);
    expect((await call({ label: 'x'.repeat(61) })).status).toBe(422);
  });

  test('is for operators and administrators of this network only', async () => {
    const statusesOf = async (method: string, path: string) =>
      Object.fromEntries(
        await Promise.all(
          Object.entries(sessions).map(async ([who, session]) => [
            who,
            (await callApi(method, path, { session })).status,
          ]),
        ),
      );
    const refused = { nobody: 401, stranger: 404, regulator: 403, liaison: 403 };
    expect(await statusesOf('GET', `${STATION}/tokens`)).toEqual({
      ...refused,
      operator: 200,
      administrator: 200,
    });
    expect(await statusesOf('POST', `${STATION}/tokens`)).toEqual({
      ...refused,
      operator: 201,
      administrator: 201,
    });
    expect(await statusesOf('DELETE', `${STATION}/tokens/999999`)).toEqual({
      ...refused,
      operator: 404,
      administrator: 404,
    });
    const { id } = await issue('of another station');
    const other = `/api/v1/networks/farther/stations/FAR-01/tokens/${id}`;
    expect((await callApi('DELETE', other, { session: sessions.stranger })).status).toBe(404);
  });
});

describe('the forms of the connect page', () => {
  const submit = (fields: Record<string, string>) =>
    submitForm(postedForm(fields), (values) => tokenOfForm(values, station, operatorId));

  test('issue a token that works at once and revoke it', async () => {
    const issued = await submit({ act: 'issue', label: 'By form' });
    const token = issued.isDone ? issued.value : null;
    expect((await post(token ?? '', station)).status).toBe(200);
    const { id } = await db()('station_tokens').where({ label: 'By form' }).first('id');
    expect(await submit({ act: 'revoke', token: String(id) })).toEqual({ isDone: true, value: null });
    expect((await post(token ?? '', station)).status).toBe(401);
  });

  test.each([
    { act: 'revoke', token: 'x' },
    { act: 'revoke', token: '999999' },
    { act: 'revoke' },
    { act: 'issue', label: 'x'.repeat(200) },
    { act: 'something' },
    {},
  ])('refuse %j in words', async (fields) => {
    const outcome = await submit(fields as Record<string, string>);
    expect(outcome.isDone).toBe(false);
    expect(!outcome.isDone && Object.values(outcome.errors)[0]?.length).toBeGreaterThan(10);
  });

  test('the ready line fits every kind of station and counts in no figure', async () => {
    for (const [code, changes] of [
      ['OCT-1', { bandFraction: '1', firstBandHz: '31.5', lastBandHz: '8000', intervalSeconds: '1' }],
      ['ONE-1', { firstBandHz: '1000', lastBandHz: '1000', intervalSeconds: '3600' }],
      ['ALL-1', { firstBandHz: '12.5', lastBandHz: '20000', intervalSeconds: '900' }],
    ] as const) {
      const outcome = await submitForm(postedForm({ ...STATION_FORM, ...changes, code }), (values) =>
        registerFromForm(values, { networkId, userId: operatorId, zone: 'Europe/London' }),
      );
      if (!outcome.isDone) throw new Error(JSON.stringify(outcome.errors));
      const answer = await post(outcome.value.token, outcome.value.station);
      expect(await answer.json(), code).toMatchObject({ accepted: 1, refused: [] });
      const seen = await callApi('GET', `/api/v1/networks/merrow/stations/${code}`, {
        session: sessions.operator,
      });
      expect((await seen.json()).station, code).toMatchObject({ latest: { flags: ['selfcheck'] } });
    }
  });
});
