import { createHash } from 'node:crypto';
import { join } from 'node:path';
import { readdirSync, utimesSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import type { Import } from '#lib/contracts/imports';
import type { Upload } from '#lib/contracts/importUploads';
import { housekeeping } from '#ingest/jobs/housekeeping';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { importsOf, storedRows, useDataDirectory, work } from './support';

useDataDirectory();
useFreshSchema();

const BASE = '/api/v1/networks/quay/imports/uploads';
const FIRST_MS = Date.UTC(2026, 2, 1);
const HEADINGS =
  'start,seconds,LAeq,LAFmax,LAFmin,LCeq,LCpeak,100,flags,windSpeed,windDirection,temperature,battery';
const startAt = (minute: number) => new Date(FIRST_MS + minute * 60_000).toISOString().replace('.000', '');
const line = (minute: number) => `${startAt(minute)},60,${40 + minute / 100},,,,,${30 + minute / 100},,,,,`;
const text = [HEADINGS, ...Array.from({ length: 900 }, (_, at) => line(at)), ''].join('\r\n');
const bytes = Buffer.from(text);
const sessions = { operator: '', regulator: '' };
const imports = importsOf('quay', () => sessions.operator);
let networkId: number;
let stationId: number;
let code: string;
let stations = 0;

beforeAll(async () => {
  networkId = await makeNetwork('quay');
  sessions.operator = (await makePerson(networkId, ['operator'])).session;
  sessions.regulator = (await makePerson(networkId, ['regulator'])).session;
});

beforeEach(async () => {
  stations += 1;
  code = `QY-${stations}`;
  stationId = await makeStation(networkId, code);
});

const call = (method: string, path: string, body?: unknown, headers?: Record<string, string>) =>
  callApi(method, `${BASE}${path}`, { session: sessions.operator, body, headers });

async function begin(asked: Record<string, unknown> = {}): Promise<Upload> {
  const response = await call('POST', '', { station: code, name: 'card.csv', bytes: bytes.length, ...asked });
  expect([200, 201]).toContain(response.status);
  return ((await response.json()) as { upload: Upload }).upload;
}

const put = (id: number, first: number, part: Uint8Array, whole = bytes.length) =>
  call('PUT', `/${id}/content`, part, {
    'content-type': 'application/octet-stream',
    'content-range': `bytes ${first}-${first + part.length - 1}/${whole}`,
  });

const finish = (id: number) => call('POST', `/${id}/finish`, {});

async function finished(id: number): Promise<Import> {
  const response = await finish(id);
  expect(response.status).toBe(201);
  return ((await response.json()) as { import: Import }).import;
}

const directory = () => join(process.env['BITTERN_DATA_DIR'] ?? '', 'imports');
const filesKept = () => readdirSync(directory());

describe('a file that comes in parts', () => {
  test('is the import that the whole file would have been, though parts come twice or at the wrong place', async () => {
    const { id, offset } = await begin();
    expect(offset).toBe(0);
    const half = 10_000;
    expect((await put(id, 0, bytes.subarray(0, half))).status).toBe(200);
    const again = await put(id, 0, bytes.subarray(0, half));
    expect(again.status).toBe(409);
    expect(await again.json()).toMatchObject({ code: 'wrong-offset', offset: half });
    expect((await put(id, half + 5, bytes.subarray(half + 5))).status).toBe(409);
    expect(await (await finish(id)).json()).toMatchObject({ status: 409, code: 'incomplete', offset: half });
    const asked = await call('GET', `/${id}`);
    expect(asked.headers.get('upload-offset')).toBe(String(half));
    expect((await put(id, half, bytes.subarray(half))).status).toBe(200);
    const opened = await finished(id);
    expect(opened).toMatchObject({ station: code, fileName: 'card.csv', bytes: bytes.length });
    expect((await finished(id)).id).toBe(opened.id);
    await work();
    expect((await imports.read(opened.id)).report).toMatchObject({ rows: 900, accepted: 900 });
    expect(filesKept().filter((name) => name.endsWith('.part'))).toEqual([]);
  });

  test('is found again by its mark, and two requests at once keep a part and make an import once', async () => {
    const mark = 'card.csv 1764600000000';
    const { id } = await begin({ mark });
    expect((await begin({ mark })).id).toBe(id);
    const parts = await Promise.all([put(id, 0, bytes), put(id, 0, bytes)]);
    expect(parts.map(({ status }) => status).sort()).toEqual([200, 409]);
    const [one, two] = await Promise.all([finished(id), finished(id)]);
    expect(one?.id).toBe(two?.id);
    expect((await begin({ mark })).id).not.toBe(id);
  });

  test('may be gzip, and is held against the SHA-256 that was announced', async () => {
    const packed = gzipSync(bytes);
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const right = await begin({ bytes: packed.length, sha256 });
    await put(right.id, 0, packed, packed.length);
    expect((await finished(right.id)).bytes).toBe(bytes.length);
    const wrong = await begin({ sha256: 'ab'.repeat(32) });
    await put(wrong.id, 0, bytes);
    expect(await (await finish(wrong.id)).json()).toMatchObject({ status: 422, code: 'unreadable' });
  });

  test('goes on from what the disk holds when that is less than was noted', async () => {
    const { id } = await begin();
    await db()('import_uploads').where({ id }).update({ received_bytes: 500 });
    const response = await put(id, 500, bytes.subarray(500));
    expect(await response.json()).toMatchObject({ code: 'wrong-offset', offset: 0 });
    expect((await put(id, 0, bytes)).status).toBe(200);
  });

  test('overwrites what a killed server wrote and had not noted', async () => {
    const { id } = await begin();
    await put(id, 0, bytes.subarray(0, 3000));
    await db()('import_uploads').where({ id }).update({ received_bytes: 1000 });
    expect((await put(id, 1000, bytes.subarray(1000))).status).toBe(200);
    const { id: importId } = await finished(id);
    await work();
    expect((await imports.read(importId)).report).toMatchObject({ rows: 900, accepted: 900 });
  });

  test('is refused before its first byte when it is too large, and in clear words when the part is wrong', async () => {
    const large = await call('POST', '', { station: code, bytes: 1024 * 1024 + 1 });
    expect(await large.json()).toMatchObject({ status: 413, code: 'too-large' });
    const { id } = await begin();
    const unsaid = await call('PUT', `/${id}/content`, bytes, { 'content-type': 'application/octet-stream' });
    expect(unsaid.status).toBe(400);
    expect((await put(id, 0, bytes, bytes.length + 1)).status).toBe(409);
    const short = await call('PUT', `/${id}/content`, bytes.subarray(0, 10), {
      'content-type': 'application/octet-stream',
      'content-range': `bytes 0-99/${bytes.length}`,
    });
    expect(short.status).toBe(400);
  });
});

test('an upload that is given up is gone, and one that nobody goes on with is removed after three days', async () => {
  const before = filesKept();
  const [kept, left] = [await begin({ mark: 'a' }), await begin({ mark: 'b' })];
  for (const { id } of [kept, left]) await put(id, 0, bytes.subarray(0, 100));
  expect((await call('DELETE', `/${kept.id}`)).status).toBe(204);
  expect((await call('GET', `/${kept.id}`)).status).toBe(404);
  const aged = async (days: number) => {
    const at = new Date(Date.now() - days * 86_400_000);
    await db()('import_uploads').where({ id: left.id }).update({ touched_at: at });
    for (const name of filesKept().filter((one) => one.endsWith('.part')))
      utimesSync(join(directory(), name), at, at);
    await housekeeping(new Date());
  };
  await aged(2);
  expect((await call('GET', `/${left.id}`)).status).toBe(200);
  await aged(4);
  expect((await call('GET', `/${left.id}`)).status).toBe(404);
  expect(filesKept().filter((name) => !before.includes(name))).toEqual([]);
});

test('only an operator uploads', async () => {
  const { id } = await begin();
  const asRegulator = (method: string, path: string) =>
    callApi(method, `${BASE}${path}`, {
      session: sessions.regulator,
      body: method === 'GET' ? undefined : {},
    });
  for (const [method, path] of [
    ['GET', ''],
    ['POST', ''],
    ['GET', `/${id}`],
    ['PUT', `/${id}/content`],
    ['POST', `/${id}/finish`],
    ['DELETE', `/${id}`],
  ] as const) {
    expect((await asRegulator(method, path)).status, `${method} ${path}`).toBe(403);
  }
});

describe('gzip in one request', () => {
  const post = (body: Uint8Array) =>
    callApi('POST', `/api/v1/networks/quay/imports?station=${code}&name=card.csv.gz`, {
      session: sessions.operator,
      headers: { 'content-type': 'text/csv', 'content-encoding': 'gzip' },
      body,
    });

  test('is unpacked, stored and comes out the same', async () => {
    const response = await post(gzipSync(bytes));
    expect(response.status).toBe(201);
    const { id } = ((await response.json()) as { import: Import }).import;
    await work();
    await imports.act(id, 'store');
    await work();
    expect(await storedRows(stationId)).toHaveLength(900);
  });

  test('that is cut short or inflates without end is refused, and nothing stays', async () => {
    const before = filesKept().length;
    const cut = await post(gzipSync(bytes).subarray(0, 900));
    expect(await cut.json()).toMatchObject({ status: 422, code: 'unreadable' });
    const bomb = await post(gzipSync(Buffer.alloc(64 * 1024 * 1024)));
    expect(await bomb.json()).toMatchObject({ status: 413, code: 'too-large' });
    expect(filesKept()).toHaveLength(before);
  });
});
