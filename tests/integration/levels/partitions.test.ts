import type { RowDataPacket } from 'mysql2/promise';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { listParted, onPartedServers, type Parted } from '#db/partitions/parted';
import { bucketOf, bucketTable } from '#db/sharding/kinds';
import { makePartitions } from '#ingest/jobs/makePartitions';
import { dropPassedMonths } from '#ingest/retention/dropMonths';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';
import { sec } from './support/desk';
import { invent, storeMeasured } from './support/measured';

/** Tables parted by months: made ahead, and dropped whole where nobody keeps anything of them. */
useFreshSchema();

const [JANUARY, FEBRUARY, MARCH, APRIL] = ['01', '02', '03', '04'].map((month) =>
  sec(`2025-${month}-01T00:00:00Z`),
) as [number, number, number, number];
const SEALED_AT = new Date('2026-04-02T03:00:00Z');
const HOUR_SEC = 3600;

let goes: number;
let stays: number;

async function parted(kind: Parted['kind']): Promise<Parted[]> {
  const found: Parted[] = [];
  await onPartedServers(async (connection) => {
    found.push(...(await listParted(connection)).filter((one) => one.kind === kind));
  });
  return found;
}

const namesOf = async (kind: Parted['kind']) =>
  new Set((await parted(kind)).map(({ partitions }) => partitions.map(({ name }) => name).join(' ')));

/** Months of long ago, as if the database had been there then. */
async function partAsThen(): Promise<void> {
  const ends = [FEBRUARY, MARCH, APRIL].map(
    (endSec, at) => `PARTITION p2025${at} VALUES LESS THAN (${endSec})`,
  );
  await onPartedServers(async (connection) => {
    for (const { kind, table } of await listParted(connection))
      if (kind === 'interval_levels')
        await connection.query(
          `ALTER TABLE ${table} PARTITION BY RANGE (starts_at) (${ends.join(', ')}, PARTITION p_open VALUES LESS THAN MAXVALUE)`,
        );
  });
}

const seal = (stationId: number, keptFromSec: number) =>
  db()('sealed_stations')
    .insert({
      station_id: stationId,
      sealed_before: keptFromSec,
      kept_from: keptFromSec,
      sealed_at: SEALED_AT,
    })
    .onConflict(['station_id'])
    .merge();

const countOf = async (stationId: number) =>
  Number(
    (await db()('interval_levels').where({ station_id: stationId }).count({ count: '*' }).first())?.count,
  );

/** Partitions and key by which an hour of a station is looked for where it lies: in our table, or in that of its bucket. */
async function plansOf(stationId: number, fromSec: number): Promise<unknown[][]> {
  const tables = new Set(['interval_levels', bucketTable('interval_levels', bucketOf(stationId))]);
  const plans: unknown[][] = [];
  await onPartedServers(async (connection) => {
    const here = (await listParted(connection)).filter(({ table }) => tables.has(table));
    for (const { table } of here) {
      const [rows] = await connection.query<RowDataPacket[]>(
        `EXPLAIN PARTITIONS SELECT laeq_centi_db FROM ${table} WHERE station_id = ? AND starts_at >= ? AND starts_at < ?`,
        [stationId, fromSec, fromSec + HOUR_SEC],
      );
      plans.push(...rows.map((row) => [row['partitions'], row['key']]));
    }
  });
  return plans;
}

beforeAll(async () => {
  goes = await makeStation(await makeNetwork('goes'), 'GOES');
  stays = await makeStation(await makeNetwork('stays'), 'STAYS');
  // Has no intervals, and prevents nothing.
  await makeStation(await makeNetwork('empty'), 'EMPTY');
});

test('months are split off before they begin, at both tables, once', async () => {
  for (const kind of ['interval_levels', 'quarter_hours'] as const)
    expect(await namesOf(kind)).toEqual(new Set(['p_before p_open']));
  const now = new Date();
  const tables = (await parted('interval_levels')).length + (await parted('quarter_hours')).length;
  // The first months hang together up to the end of the one of the migration.
  expect(await makePartitions(now)).toBe(`${2 * tables} made`);
  expect(await makePartitions(now)).toBe('0 made');
  const inAYear = new Date(Date.UTC(now.getUTCFullYear() + 1, now.getUTCMonth(), 3));
  expect(await makePartitions(inAYear)).toBe(`${12 * tables} made`);
});

test('a range of time is looked for in its months alone', async () => {
  await partAsThen();
  const months = [JANUARY, FEBRUARY, MARCH];
  for (const stationId of [goes, stays])
    for (const fromSec of months) {
      const stretch = {
        fromSec,
        toSec: fromSec + HOUR_SEC,
        intervalSec: 60,
        bands: [-16, 9] as [number, number],
        gaps: 0,
      };
      await storeMeasured(stationId, await invent(stretch, stationId));
    }
  expect(await plansOf(goes, FEBRUARY)).toEqual([['p20251', 'PRIMARY']]);
  expect(await countOf(goes)).toBe(180);
});

test('a month that any station keeps stays whole; one that nobody keeps goes at once, with nothing else', async () => {
  expect(await dropPassedMonths(SEALED_AT), 'nothing is sealed').toBe(0);
  await seal(goes, MARCH);
  expect(await dropPassedMonths(SEALED_AT), 'the other keeps everything').toBe(0);
  await seal(stays, FEBRUARY);
  expect(await dropPassedMonths(new Date(SEALED_AT.getTime() - 1)), 'not known everywhere yet').toBe(0);
  const servers = (await parted('interval_levels')).length;
  expect(await dropPassedMonths(SEALED_AT)).toBe(servers);
  expect(await namesOf('interval_levels')).toEqual(new Set(['p20251 p20252 p_open']));
  expect(await countOf(goes)).toBe(120);
  expect(await countOf(stays)).toBe(120);
  expect(await dropPassedMonths(SEALED_AT)).toBe(0);
  await seal(stays, MARCH);
  expect(await dropPassedMonths(SEALED_AT)).toBe(servers);
  expect(await countOf(stays)).toBe(60);
});

test('a station that stores something old before a month goes is waited for', async () => {
  const late = await makeStation(await makeNetwork('late'), 'LATE');
  for (const id of [goes, stays]) await seal(id, APRIL);
  const trx = await db().transaction();
  await trx('station_locks').where({ station_id: late }).forUpdate().select();
  await trx('interval_levels').insert({
    ...(await db()('interval_levels').where({ station_id: goes }).first()),
    station_id: late,
  });
  const dropping = dropPassedMonths(SEALED_AT);
  await new Promise((resolve) => setTimeout(resolve, 300));
  await trx.commit();
  expect(await dropping).toBe(0);
  expect(await countOf(late)).toBe(1);
});
