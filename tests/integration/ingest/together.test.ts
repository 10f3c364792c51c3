import fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { lockStation } from '#db/queries/stations';
import { findStationByToken, insertStationToken, type TokenStation } from '#db/queries/stationTokens';
import { readEnvelope } from '#ingest/receive/envelope';
import { receiveBatch } from '#ingest/receive/receive';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

useFreshSchema();

const NOW = new Date('2026-03-02T00:00:00Z');
const FIRST_MS = Date.parse('2026-03-01T00:00:00Z');
const LIVE = 3;
const TABLES = {
  interval_levels:
    'starts_at, duration_sec, laeq_centi_db, HEX(band_levels_centi_db) AS levels, battery_centi_v, flags',
  dirty_marks: 'quarter_starts_at',
  station_latest: 'starts_at, duration_sec, laeq_centi_db, battery_centi_v, received_at',
  quarantine: 'code, detail, record, times_received, received_at',
  station_clocks: 'ahead_sec, ahead_before_sec, noted_at',
  clock_offsets: 'quarter_starts_at, ahead_sec',
};

/** A record of a minute. */
const minute = (at: number) => ({
  start: new Date(FIRST_MS + at * 60_000).toISOString(),
  seconds: 60,
  LAeq: 50,
});

let networkId: number;
let stations = 0;

beforeAll(async () => {
  networkId = await makeNetwork('together');
  const [first] = await makeStations();
  // Its band sets are remembered from now on, so that no post waits for them.
  for (const bands of [[], [100, 125], [100]]) {
    await take({ station: first!, records: [minute(0)], bands, sentAt: null });
  }
});

interface Post {
  station: TokenStation;
  records: unknown[];
  bands: number[];
  sentAt: string | null;
}

function take({ station, records, bands, sentAt }: Post) {
  const text = JSON.stringify({ bands, intervals: records, ...(sentAt === null ? {} : { sentAt }) });
  return receiveBatch(station, readEnvelope(text, 3), NOW, station);
}

/** Some stations that take posts, and one that was retired since its token was remembered. */
async function makeStations(): Promise<TokenStation[]> {
  const made: TokenStation[] = [];
  for (let at = 0; at <= LIVE; at += 1) {
    const id = await makeStation(networkId, `TG-${(stations += 1)}`);
    const secret = await inTransaction((transaction) => insertStationToken(id, null, transaction));
    made.push((await findStationByToken(secret))!);
  }
  await db()('stations').where({ id: made[LIVE]!.id }).update({ retired_at: NOW });
  return made;
}

async function tablesOf(made: readonly TokenStation[]): Promise<unknown> {
  const tables: Record<string, unknown> = {};
  for (const [table, columns] of Object.entries(TABLES)) {
    for (const [at, { id }] of made.entries()) {
      const [rows] = await db().raw(`SELECT ${columns} FROM ${table} WHERE station_id = ?`, [id]);
      tables[`${table} ${at}`] = (rows as unknown[]).map((row) => JSON.stringify(row)).sort();
    }
  }
  return tables;
}

async function answerOf(taking: Promise<unknown>): Promise<unknown> {
  return taking.catch((error: Error) => error.name);
}

const record = fc.record({
  start: fc.integer({ min: 0, max: 15 }).map((at) => new Date(FIRST_MS + at * 60_000).toISOString()),
  seconds: fc.constantFrom(60, 60, 60, 120),
  LAeq: fc.constantFrom(50, 50, 51.234, 'loud'),
  battery: fc.constantFrom(null, 12.345),
});
const mixed = fc.array(
  fc.record({
    at: fc.integer({ min: 0, max: LIVE }),
    records: fc.array(record, { minLength: 1, maxLength: 4 }),
    bands: fc.constantFrom<number[]>([], [100, 125], [100], [101]),
    sentAt: fc.constantFrom(null, '2026-03-02T00:00:01Z', '2026-03-01T23:59:58Z'),
  }),
  { minLength: 2, maxLength: 14 },
);

function withLevels({ records, bands }: { records: object[]; bands: number[] }): unknown[] {
  return records.map((one) => ({ ...one, levels: bands.map((_, at) => 30 + at) }));
}

test('posts that share transactions leave the same tables and get the same answers as one by one', async () => {
  await fc.assert(
    fc.asyncProperty(mixed, async (drawn) => {
      const [apart, together] = [await makeStations(), await makeStations()];
      const postsTo = (made: TokenStation[]) =>
        drawn.map(({ at, ...post }) => ({ ...post, station: made[at]!, records: withLevels(post) }));
      const oneByOne: unknown[] = [];
      for (const post of postsTo(apart)) oneByOne.push(await answerOf(take(post)));
      const atOnce = await Promise.all(postsTo(together).map((post) => answerOf(take(post))));
      expect(atOnce).toEqual(oneByOne);
      expect(await tablesOf(together)).toEqual(await tablesOf(apart));
    }),
    { numRuns: 12, endOnFailure: true },
  );
});

test('what fails a whole group fails only the post that it lies in', async () => {
  const [first, second, third] = await makeStations();
  const poisoned = readEnvelope(JSON.stringify({ bands: [], intervals: [minute(0)] }), 3);
  poisoned.sentAtSec = NaN;
  const answers = await Promise.allSettled([
    take({ station: first!, records: [minute(0)], bands: [], sentAt: null }),
    receiveBatch(second!, poisoned, NOW, second!),
    take({ station: third!, records: [minute(0)], bands: [], sentAt: null }),
  ]);
  expect(answers.map(({ status }) => status)).toEqual(['fulfilled', 'rejected', 'fulfilled']);
  const ids = [first!.id, second!.id, third!.id];
  expect(
    await db()('interval_levels').whereIn('station_id', ids).orderBy('station_id').pluck('station_id'),
  ).toEqual([first!.id, third!.id]);
});

test('a station that somebody holds keeps only its own posts waiting', async () => {
  const [held, free] = await makeStations();
  let isHeldTaken = false;
  let waiting: Promise<unknown> = Promise.resolve();
  await inTransaction(async (transaction) => {
    await lockStation(held!.id, transaction);
    waiting = take({ station: held!, records: [minute(0)], bands: [], sentAt: null }).then(
      () => (isHeldTaken = true),
    );
    await take({ station: free!, records: [minute(0)], bands: [], sentAt: null });
    await take({ station: free!, records: [minute(1)], bands: [], sentAt: null });
    expect(isHeldTaken).toBe(false);
  });
  await waiting;
  expect(isHeldTaken).toBe(true);
});

test('a token that is unknown, ended or of a retired station is refused beside others that are taken', async () => {
  const tokens: string[] = [];
  const ids: number[] = [];
  for (let at = 0; at < LIVE; at += 1) {
    const id = await makeStation(networkId, `TG-${(stations += 1)}`);
    ids.push(id);
    tokens.push(await inTransaction((transaction) => insertStationToken(id, null, transaction)));
  }
  const postAll = async (at: number) =>
    Promise.all(
      [...tokens, 'bs_unknown'].map(async (token) => {
        const body = { bands: [], intervals: [minute(at)] };
        return (await callApi('POST', '/api/v1/intervals', { token, body })).status;
      }),
    );
  expect(await postAll(0)).toEqual([200, 200, 200, 401]);
  await db()('station_tokens').where({ station_id: ids[0] }).update({ revoked_at: NOW });
  await db()('stations').where({ id: ids[1] }).update({ retired_at: NOW });
  expect(await postAll(1)).toEqual([401, 401, 200, 401]);
});
