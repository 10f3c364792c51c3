import { readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { config } from '#lib/config/index';
import { jpegOf, segment, TABLE } from '../../unit/photos/builtPhotos';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';
import { roleSessions, type Sessions } from './support';

useFreshSchema();

const PATH = '/api/v1/networks/merrow/stations/MER-01/photos';
const PICTURE = jpegOf([TABLE]);
const TAKEN = jpegOf([segment(0xe1, Buffer.from(`Exif\0\0GPS ${Date.now()}`)), TABLE]);
let sessions: Sessions;

beforeAll(async () => {
  const networkId = await makeNetwork('merrow');
  sessions = await roleSessions(networkId, await makeNetwork('farther'));
  await makeStation(networkId, 'MER-01');
  await makeStation(networkId, 'MER-02');
});

const add = (body: Buffer, session = sessions.operator, query = 'caption=The+mast&takenOn=2026-03-02') =>
  callApi('POST', `${PATH}?${query}`, { session, body, headers: { 'content-type': 'image/jpeg' } });

const added = async () => ((await (await add(TAKEN)).json()) as { photo: { id: number } }).photo.id;

test('is kept without its place, served as an inert file to everybody of the network and to nobody else', async () => {
  const id = await added();
  const statuses = await Promise.all(
    Object.entries(sessions).map(async ([who, session]) => {
      return [who, (await callApi('GET', `${PATH}/${id}`, { session })).status];
    }),
  );
  expect(Object.fromEntries(statuses)).toEqual({
    nobody: 401,
    stranger: 404,
    regulator: 200,
    liaison: 200,
    operator: 200,
    administrator: 200,
  });
  const answer = await callApi('GET', `${PATH}/${id}`, { session: sessions.regulator });
  expect(Object.fromEntries(answer.headers)).toMatchObject({
    'content-type': 'image/jpeg',
    'content-disposition': `attachment; filename="MER-01-photo-${id}.jpg"`,
    'x-content-type-options': 'nosniff',
    'content-security-policy': "default-src 'none'; sandbox",
  });
  expect(Buffer.from(await answer.arrayBuffer())).toEqual(PICTURE);
  const elsewhere = await callApi('GET', `${PATH.replace('MER-01', 'MER-02')}/${id}`, {
    session: sessions.operator,
  });
  expect(elsewhere.status).toBe(404);
});

test('is refused when it is none, too large, undated or from somebody who is no operator', async () => {
  expect((await add(Buffer.from('<svg/>'))).status).toBe(422);
  expect((await add(TAKEN.subarray(0, 60))).status).toBe(422);
  expect((await add(Buffer.alloc(9 * 1024 * 1024))).status).toBe(413);
  expect((await add(TAKEN, sessions.operator, 'caption=&takenOn=soon')).status).toBe(422);
  expect((await add(TAKEN, sessions.liaison)).status).toBe(403);
});

test('is gone from the disk when the last photo of the same file is deleted; the acts are audited, without words', async () => {
  const [one, other] = [await added(), await added()];
  const remove = (id: number, session = sessions.operator) => callApi('DELETE', `${PATH}/${id}`, { session });
  const files = () => readdir(join(config().dataDir, 'photos'));
  expect((await remove(one, sessions.regulator)).status).toBe(403);
  const ids = await db()('station_photos').whereNot({ id: other }).pluck('id');
  for (const id of ids) expect((await remove(id)).status).toBe(204);
  const [{ sha256 }] = await db()('station_photos').select('sha256');
  expect(await files()).toContain(sha256.toString('hex'));
  expect((await remove(other)).status).toBe(204);
  expect((await remove(other)).status).toBe(404);
  expect(await files()).not.toContain(sha256.toString('hex'));
  const entries = await db()('audit_log').where('action', 'like', 'photo.%').pluck('detail');
  expect(entries.length).toBeGreaterThan(4);
  expect(JSON.stringify(entries)).not.toContain('mast');
});
