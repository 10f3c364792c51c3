import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findImport } from '#db/queries/imports';
import { findStationById } from '#db/queries/stations';
import { insertStationToken } from '#db/queries/stationTokens';
import { aggregateMarks } from '#ingest/aggregate/aggregate';
import { checkImport } from '#ingest/imports/check';
import { storeImport } from '#ingest/imports/storeStaged';
import { undoImport } from '#ingest/imports/undo';
import { intervalsCsv } from '#lib/services/intervals/csv';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { importsOf, storedRows, useDataDirectory, work } from './support';

useDataDirectory();
useFreshSchema();

const FIRST_SEC = Date.UTC(2026, 2, 1) / 1000;
const DAY = { fromSec: FIRST_SEC, toSec: FIRST_SEC + 86_400 };
const HEADINGS =
  'start,seconds,LAeq,LAFmax,LAFmin,LCeq,LCpeak,100,125,160,flags,windSpeed,windDirection,temperature,battery';
const sessions = { operator: '', regulator: '', liaison: '', stranger: '' };
const imports = importsOf('quay', () => sessions.operator);
let networkId: number;
let stationId: number;
let code: string;
let stations = 0;

beforeAll(async () => {
  networkId = await makeNetwork('quay');
  const elsewhere = await makeNetwork('elsewhere');
  sessions.operator = (await makePerson(networkId, ['operator'])).session;
  sessions.regulator = (await makePerson(networkId, ['regulator'])).session;
  sessions.liaison = (await makePerson(networkId, ['liaison'])).session;
  sessions.stranger = (await makePerson(elsewhere, ['operator'])).session;
});

beforeEach(async () => {
  stations += 1;
  code = `QY-${stations}`;
  stationId = await makeStation(networkId, code);
});

const instant = (minute: number) =>
  new Date((FIRST_SEC + minute * 60) * 1000).toISOString().replace('.000', '');
const round = (value: number) => Number(value.toFixed(2));
const levelAt = (minute: number) => round(40 + (minute % 300) / 10);
const line = (minute: number, laeq = levelAt(minute)) =>
  [
    `${instant(minute)},60,${laeq},${round(laeq + 9.01)},,55.5,,${round(laeq - 4)},,${round(laeq - 7.33)}`,
    `${minute % 3 ? '' : 'rain wind'},2.31,270,-3.25,12.4`,
  ].join(',');
const file = (minutes: number[]) => [HEADINGS, ...minutes.map((minute) => line(minute)), ''].join('\r\n');
const upTo = (count: number) => Array.from({ length: count }, (_, minute) => minute);

async function post(minutes: number[], laeq?: number) {
  const token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
  const intervals = minutes.map((minute) => ({
    start: instant(minute),
    seconds: 60,
    LAeq: laeq ?? levelAt(minute),
    LAFmax: round(levelAt(minute) + 9.01),
    LCeq: 55.5,
    levels: [round(levelAt(minute) - 4), null, round(levelAt(minute) - 7.33)],
    flags: minute % 3 ? [] : ['wind', 'rain'],
    windSpeed: 2.31,
    windDirection: 270,
    temperature: -3.25,
    battery: 12.4,
  }));
  const answer = await callApi('POST', '/api/v1/intervals', {
    token,
    body: { bands: [100, 125, 160], intervals },
  });
  expect(answer.status).toBe(200);
}

async function stationRow() {
  const station = await findStationById(stationId);
  if (!station) throw new Error('The station is gone.');
  return station;
}

async function importRow(id: number) {
  const row = await findImport(networkId, id);
  if (!row) throw new Error('The import is gone.');
  return row;
}

describe('a file in Bittern’s own format', () => {
  test('makes the round trip exactly: all accepted, then all known, and written the same again', async () => {
    const text = file(upTo(1440));
    const first = await imports.upload(code, text);
    expect(first).toMatchObject({ state: 'checking', fileName: 'card.csv', bytes: text.length });
    await work();
    const checked = await imports.read(first.id);
    expect(checked).toMatchObject({
      state: 'checked',
      bytesDone: text.length,
      report: { rows: 1440, accepted: 1440, known: 0, refused: [], firstStart: instant(0) },
    });
    expect(await storedRows(stationId)).toEqual([]);
    await imports.act(first.id, 'store');
    await work();
    expect(await imports.read(first.id)).toMatchObject({
      state: 'stored',
      stored: 1440,
      refusedMeanwhile: 0,
    });
    const written = await intervalsCsv(await stationRow(), DAY);
    expect(written).toBe(text);
    const second = await imports.upload(code, `\ufeff${written}`);
    await work();
    expect((await imports.read(second.id)).report).toMatchObject({
      rows: 1440,
      accepted: 0,
      known: 1440,
      refused: [],
    });
  });

  test('says of every row what a post would: known, conflicting, refused and why, with its line', async () => {
    await post([0, 1]);
    await post([2], 99);
    const text = [
      HEADINGS,
      line(0),
      line(2),
      line(3),
      line(3),
      line(3, 77),
      `${instant(4)},600,50,,,,,,,,,,,,`,
      line(5),
      `${instant(20)},60,abc,,,,,,,,,,,,`,
      `${instant(21)},60,250,,,,,,,,,,,,`,
      `${instant(22)},60,50,,,,,,,`,
      '2036-03-01T00:00:00Z,60,50,,,,,,,,,,,,',
      '',
    ].join('\n');
    const { id } = await imports.upload(code, text);
    await work();
    const { report } = await imports.read(id);
    expect(report).toMatchObject({ rows: 11, accepted: 2, known: 2, conflicting: 2 });
    expect(report.refused.map(({ reason, count, examples }) => [reason, count, examples[0]?.line])).toEqual([
      ['malformed', 2, 9],
      ['out-of-range', 1, 10],
      ['clock-ahead', 1, 12],
      ['overlap', 1, 8],
      ['conflict', 2, 3],
    ]);
    await imports.act(id, 'store');
    await work();
    const stored = await imports.read(id);
    expect(stored).toMatchObject({ stored: report.accepted, knownMeanwhile: 0, refusedMeanwhile: 0 });
    const kept = await db()('quarantine').where({ import_id: id }).orderBy('id').pluck('code');
    expect(kept).toHaveLength(7);
  });

  test('whatever the order of its rows, stores the same as a post of them', async () => {
    const minutes = upTo(300);
    const shuffled = minutes.map((at) => (at * 7) % 300);
    const { id } = await imports.upload(code, file([...shuffled, ...shuffled.slice(0, 40)]));
    await work();
    expect((await imports.read(id)).report).toMatchObject({ accepted: 300, known: 40 });
    await imports.act(id, 'store');
    await work();
    const rows = await storedRows(stationId);
    const other = await makeStation(networkId, `${code}-B`);
    const again = await imports.upload(`${code}-B`, file(minutes));
    await work();
    await imports.act(again.id, 'store');
    await work();
    expect(rows).toEqual(await storedRows(other));
  });
});

describe('a crash', () => {
  test('at any chunk neither loses nor doubles a row, in the check, in storing and in undoing', async () => {
    const { id } = await imports.upload(code, file(upTo(7000)));
    const justOne = () => true;
    let rounds = 0;
    // Each call ends after one committed chunk, as a killed worker does; the next begins from the database alone.
    while ((await importRow(id)).state === 'checking') {
      await checkImport(await importRow(id), justOne);
      rounds += 1;
    }
    expect(rounds).toBeGreaterThanOrEqual(4);
    expect((await imports.read(id)).report).toMatchObject({ rows: 7000, accepted: 7000 });
    await imports.act(id, 'store');
    await storeImport(await importRow(id), justOne);
    expect(await storedRows(stationId)).toHaveLength(2000);
    // One that fails in the middle of its transaction leaves nothing behind.
    await db().raw(
      `CREATE TRIGGER crash BEFORE DELETE ON import_intervals FOR EACH ROW
       SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'killed'`,
    );
    await expect(storeImport(await importRow(id), justOne)).rejects.toThrow('killed');
    await db().raw('DROP TRIGGER crash');
    expect(await storedRows(stationId)).toHaveLength(2000);
    // A second worker at the same time does no harm.
    const row = await importRow(id);
    await Promise.all([storeImport(row, () => false), storeImport(row, () => false)]);
    expect(await storedRows(stationId)).toHaveLength(7000);
    expect(await imports.read(id)).toMatchObject({ state: 'stored', stored: 7000, knownMeanwhile: 0 });
    await imports.act(id, 'undo', 'A trial.');
    await undoImport(await importRow(id), justOne);
    expect(await storedRows(stationId)).toHaveLength(5000);
    await work();
    expect(await storedRows(stationId)).toEqual([]);
  });
});

describe('undoing', () => {
  const TABLES = ['interval_levels', 'quarter_hours', 'day_periods', 'station_latest', 'quarantine'];
  const everything = async () => {
    while ((await aggregateMarks(async () => undefined)).quarters > 0);
    const tables = TABLES.map(async (table) => {
      const rows: Record<string, unknown>[] = await db()(table)
        .where({ station_id: stationId })
        .orderByRaw('1, 2')
        .select('*');
      return rows.map((row) => ({ ...row, computed_at: null }));
    });
    return Promise.all(tables);
  };

  test('restores the tables to the byte, redoing stores the same again, and what came between is in its way', async () => {
    await post([0, 1, 2, 100, 101]);
    await post([3], 99);
    await post([3], 98);
    const before = await everything();
    const { id } = await imports.upload(code, file(upTo(200)));
    await work();
    await imports.act(id, 'store');
    await work();
    const after = await everything();
    expect(after[0]).toHaveLength(200);
    expect(after[4]).toHaveLength(2);
    const without = await imports.call('POST', `/${id}/acts`, { act: 'undo' });
    expect(without.status).toBe(422);
    await imports.act(id, 'undo', 'The card of another station.');
    await work();
    expect(await everything()).toEqual(before);
    expect(await imports.read(id)).toMatchObject({
      state: 'undone',
      stored: 0,
      lastAct: { reason: 'The card of another station.' },
    });
    await imports.act(id, 'redo');
    await work();
    expect((await imports.read(id)).state).toBe('stored');
    expect(await storedRows(stationId)).toHaveLength(200);
    await imports.act(id, 'undo', 'Still wrong.');
    await work();
    await post([50], 70);
    await imports.act(id, 'redo');
    await work();
    const refused = await imports.read(id);
    expect(refused.state).toBe('undone');
    expect(refused.problem).toContain(instant(50));
    expect(await storedRows(stationId)).toHaveLength(7);
    await imports.act(id, 'discard');
    await work();
    expect(await imports.read(id)).toMatchObject({ state: 'discarded' });
    expect(await db()('import_intervals').where({ import_id: id })).toEqual([]);
    expect(await findAuditBreak()).toBeNull();
  });
});

describe('a foreign file', () => {
  const FOREIGN = [
    'Logger 17;;;',
    'Date;Time;Leq(A) [dB];LZeq 63 Hz;LZeq 1 kHz;Note',
    '25.10.2025;00:59:00;51,2;48,25;40,1;',
    '25.10.2025;01:00:00;51,3;48,26;---;x',
    '26.10.2025;00:30:00;52,1;;40,2;',
    '26.10.2025;01:30:00;52,2;48,1;40,2;',
    '26.10.2025;02:30:00;52,3;48,1;40,2;',
    '29.03.2026;01:30:00;53,1;48,1;40,2;',
    '29.03.2026;31:30:00;53,2;48,1;40,2;',
    '',
  ].join('\r\n');
  const MAPPING = {
    delimiter: ';',
    decimal: ',',
    headerLine: 2,
    columns: ['date', 'time', 'LAeq', '63', '1000', null],
    dateOrder: 'dmy',
    zone: 'Europe/London',
    seconds: 60,
  };

  test('waits for its mapping, and tells local times that came twice or never instead of guessing', async () => {
    const { id, state } = await imports.upload(code, FOREIGN);
    expect(state).toBe('mapping');
    await imports.map(id, MAPPING);
    await work();
    const { report } = await imports.read(id);
    expect(report).toMatchObject({ rows: 7, accepted: 4 });
    expect(report.refused).toMatchObject([
      { reason: 'malformed', count: 1, examples: [{ line: 9 }] },
      { reason: 'ambiguous-time', count: 1, examples: [{ line: 6 }] },
      { reason: 'nonexistent-time', count: 1, examples: [{ line: 8 }] },
    ]);
    await imports.act(id, 'store');
    await work();
    const rows = await db()('interval_levels')
      .where({ station_id: stationId })
      .orderBy('starts_at')
      .select('*');
    expect(rows.map((row) => new Date(row.starts_at * 1000).toISOString().slice(0, 16))).toEqual([
      '2025-10-24T23:59',
      '2025-10-25T00:00',
      '2025-10-25T23:30',
      '2025-10-26T02:30',
    ]);
    expect(rows[0]).toMatchObject({ laeq_centi_db: 5120, duration_sec: 60 });
    expect(rows[0].band_levels_centi_db.readInt16LE(0)).toBe(4825);
    expect(rows[1].band_levels_centi_db.readInt16LE(2)).toBe(-32768);
  });

  test('can be mapped anew: a clock that never changes has no hour twice, and a time may name the end', async () => {
    const { id } = await imports.upload(code, FOREIGN);
    await imports.map(id, MAPPING);
    await work();
    await imports.map(id, { ...MAPPING, zone: 'UTC+1', marks: 'end' });
    await work();
    const { report } = await imports.read(id);
    expect(report).toMatchObject({ rows: 7, accepted: 6, firstStart: '2025-10-24T23:58:00Z' });
  });

  test.each([
    [
      'a band that the station cannot have',
      { columns: ['date', 'time', 'LAeq', '64', '1000', null] },
      /64 Hz/,
    ],
    ['a zone that is none', { zone: 'Europe/Atlantis' }, /zone/],
    ['no start', { columns: [null, 'time', 'LAeq', null, null, null] }, /start/],
    ['two columns for one thing', { columns: ['date', 'time', 'LAeq', 'LAeq', null, null] }, /two columns/],
    ['no length', { seconds: null }, /column tells it/],
  ])('is not checked with %s', async (_, changes, words) => {
    const { id } = await imports.upload(code, FOREIGN);
    const answer = await imports.call('PUT', `/${id}/mapping`, { ...MAPPING, ...changes });
    expect(answer.status).toBe(422);
    expect(((await answer.json()) as { detail: string }).detail).toMatch(words);
    expect((await imports.read(id)).state).toBe('mapping');
  });
});

describe('a file that cannot be used', () => {
  test.each([
    ['nothing', '', 422],
    ['one word', 'word', 422],
    ['UTF-16', Buffer.from('a,b\n1,2\n', 'utf16le').toString('latin1'), 422],
    ['more than the setting allows', `a,b\n${'1,2\n'.repeat(300_000)}`, 413],
  ])('is refused at once: %s', async (_, text, status) => {
    const answer = await callApi('POST', `/api/v1/networks/quay/imports?station=${code}`, {
      session: sessions.operator,
      headers: { 'content-type': 'text/csv' },
      body: text,
    });
    expect(answer.status).toBe(status);
    expect(await answer.json()).toMatchObject({ status, code: expect.any(String) });
  });

  test('fails in words where a quotation mark is never closed, and nothing of it can be stored', async () => {
    const { id } = await imports.upload(code, `${file(upTo(3))}"${'x,'.repeat(60_000)}`);
    await work();
    const failed = await imports.read(id);
    expect(failed.state).toBe('failed');
    expect(failed.problem).toMatch(/after line 4.*quotation mark/);
    expect((await imports.call('POST', `/${id}/acts`, { act: 'store' })).status).toBe(409);
  });
});

test('operators act; others of the network look; strangers find nothing', async () => {
  const { id } = await imports.upload(code, file([0]));
  await work();
  for (const session of [sessions.regulator, sessions.liaison]) {
    const others = importsOf('quay', () => session);
    expect((await others.call('GET', '')).status).toBe(200);
    expect((await others.call('GET', `/${id}`)).status).toBe(200);
    expect((await others.call('POST', `/${id}/acts`, { act: 'store' })).status).toBe(403);
    expect((await others.call('POST', `?station=${code}`, 'a,b')).status).toBe(403);
  }
  const strangers = importsOf('quay', () => sessions.stranger);
  expect((await strangers.call('GET', `/${id}`)).status).toBe(404);
  const fromHome = importsOf('elsewhere', () => sessions.stranger);
  expect((await fromHome.call('GET', `/${id}`)).status).toBe(404);
  expect((await fromHome.call('POST', `/${id}/acts`, { act: 'store' })).status).toBe(404);
  expect((await fromHome.call('POST', `?station=${code}`, 'a,b')).status).toBe(404);
});
