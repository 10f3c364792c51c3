import fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { readEnvelope } from '#ingest/receive/envelope';
import { receiveBatch } from '#ingest/receive/receive';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

useFreshSchema();

const NOW = new Date('2026-03-02T00:00:00Z');
const FIRST_SEC = Date.parse('2026-03-01T00:00:00Z') / 1000;
const RECORDS = Array.from({ length: 40 }, (_, at) => ({
  start: new Date((FIRST_SEC + at * 60) * 1000).toISOString(),
  seconds: 60,
  LAeq: 40 + at / 10,
  levels: [30 + at / 10, at % 3 === 0 ? null : 31],
  flags: at % 5 === 0 ? ['wind'] : [],
}));
let networkId: number;
let stations = 0;

beforeAll(async () => {
  networkId = await makeNetwork('order');
});

async function tablesAfter(posts: unknown[][]) {
  stations += 1;
  const id = await makeStation(networkId, `OR-${stations}`);
  for (const intervals of posts) {
    const envelope = readEnvelope(JSON.stringify({ bands: [100, 125], intervals }), 3);
    await receiveBatch({ id, bandFraction: 3, acceptsFromSec: null }, envelope, NOW);
  }
  const rows = await db()('interval_levels').where({ station_id: id }).orderBy('starts_at').select('*');
  const quarters = await db()('dirty_marks')
    .where({ station_id: id })
    .distinct()
    .orderBy('quarter_starts_at')
    .pluck('quarter_starts_at');
  return { rows: rows.map((row) => ({ ...row, station_id: 0 })), quarters };
}

test('any order, split or repetition of posts gives identical tables', async () => {
  const expected = await tablesAfter([RECORDS]);
  expect(expected.rows).toHaveLength(RECORDS.length);
  const shuffledWithRepeats = fc
    .shuffledSubarray([...RECORDS, ...RECORDS.slice(0, 15)], { minLength: RECORDS.length + 15 })
    .chain((records) =>
      fc
        .array(fc.integer({ min: 1, max: 20 }), { minLength: 3, maxLength: 12 })
        .map((sizes) => split(records, sizes)),
    );
  await fc.assert(
    fc.asyncProperty(shuffledWithRepeats, async (posts) => {
      expect(await tablesAfter(posts)).toEqual(expected);
    }),
    { numRuns: 15 },
  );
});

test('posts at the same time leave each interval once', async () => {
  const id = await makeStation(networkId, 'OR-AT-ONCE');
  const envelope = () => readEnvelope(JSON.stringify({ bands: [100, 125], intervals: RECORDS }), 3);
  const receipts = await Promise.all(
    Array.from({ length: 6 }, () =>
      receiveBatch({ id, bandFraction: 3, acceptsFromSec: null }, envelope(), NOW),
    ),
  );
  expect(receipts.reduce((sum, { accepted }) => sum + accepted, 0)).toBe(RECORDS.length);
  expect(receipts.every(({ accepted, known }) => accepted + known === RECORDS.length)).toBe(true);
});

function split<T>(items: T[], sizes: number[]): T[][] {
  const posts: T[][] = [];
  let at = 0;
  for (let turn = 0; at < items.length; turn += 1) {
    const size = sizes[turn % sizes.length] ?? 1;
    posts.push(items.slice(at, at + size));
    at += size;
  }
  return posts;
}
