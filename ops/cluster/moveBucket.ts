import type { Connection, RowDataPacket } from 'mysql2/promise';
import { db } from '#db/client';
import { connectTo, dataServers, linkName, type DataServer } from '#db/sharding/dataServers';
import { BUCKETS, bucketTable, KINDS } from '#db/sharding/kinds';
import { linkServers } from '#db/sharding/linkServers';
import { replaceLinks } from '#db/sharding/relink';
import { definitionOf } from '#db/sharding/shardTables';
import { bucketTableText, serversOfLinkTable } from '#db/sharding/texts';
import { copyPart } from './copyPart';
import { beginQueue, dropBucketText, holdText, nextParts, partDone } from './moveQueue';
import { isOutOfReach, putOutOfReach } from './outOfReach';

const PARTS_AT_ONCE = 50;
/** So few parts are copied while the bucket is held. */
const FEW_PARTS = 20;
/** Times that all but a few are copied before it is held anyway. */
const MOST_ROUNDS = 200;

/** The server of each bucket, as the head has it. */
export async function placesOfBuckets(): Promise<DataServer[]> {
  const links = serversOfLinkTable(await definitionOf(db(), 'interval_levels'));
  return links.map((link, bucket) => {
    const server = dataServers().find((one) => linkName(one) === link);
    if (!server) throw new Error(`Bucket ${bucket} is on ${link}, which the settings do not name.`);
    return server;
  });
}

/**
 * Moves a bucket to another server while it is used. Rows are copied part by part; what changes is noted by triggers and copied again. For the last of
 * it the bucket is held; posts wait, or are asked to come again. The old tables are put out of reach before the head leads to the new ones, and dropped
 * afterwards. Every part was compared by then. Broken off, it goes on where it was when called again.
 * @returns for how long it was held, in milliseconds.
 */
export async function moveBucket(bucket: number, to: DataServer): Promise<number> {
  const from = (await placesOfBuckets())[bucket];
  if (!from) throw new Error(`There is no bucket ${bucket}.`);
  await linkServers(db(), dataServers());
  if (from.name === to.name) {
    await dropElsewhere(bucket, to);
    return 0;
  }
  const source = await connectTo(from);
  const target = await connectTo(to, { isDatabaseThere: false });
  try {
    const startedMs = performance.now();
    if (await isOutOfReach(source, bucket)) {
      await leadTo(bucket, to);
      await source.query(dropBucketText(bucket));
      return performance.now() - startedMs;
    }
    await prepareTarget(source, target, bucket);
    await beginQueue(source, bucket);
    for (let round = 0; round < MOST_ROUNDS; round += 1) {
      const parts = await nextParts(source, bucket, PARTS_AT_ONCE);
      await copyParts(source, target, bucket, parts);
      if (parts.length <= FEW_PARTS) break;
    }
    return await switchOver(source, target, bucket, to);
  } finally {
    await Promise.all([source.end(), target.end()]);
  }
}

async function prepareTarget(source: Connection, target: Connection, bucket: number): Promise<void> {
  const [[named]] = await source.query<RowDataPacket[]>('SELECT DATABASE() AS name');
  const name = String(named?.['name']);
  await target.query(
    `CREATE DATABASE IF NOT EXISTS \`${name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`,
  );
  await target.query(`USE \`${name}\``);
  for (const kind of KINDS) {
    const [[row]] = await source.query<RowDataPacket[]>(`SHOW CREATE TABLE ${bucketTable(kind, bucket)}`);
    await target.query(bucketTableText(String(row?.['Create Table']), kind, bucket));
  }
}

async function copyParts(
  source: Connection,
  target: Connection,
  bucket: number,
  parts: Awaited<ReturnType<typeof nextParts>>,
): Promise<void> {
  for (const part of parts)
    if (await copyPart(source, target, bucket, part)) await partDone(source, bucket, part);
}

/** Holds the bucket, copies the rest, puts the old tables out of reach, leads the head to the new server, and drops them. */
async function switchOver(
  source: Connection,
  target: Connection,
  bucket: number,
  to: DataServer,
): Promise<number> {
  const startedMs = performance.now();
  await source.query(holdText(bucket));
  for (;;) {
    const parts = await nextParts(source, bucket, PARTS_AT_ONCE);
    if (parts.length === 0) break;
    await copyParts(source, target, bucket, parts);
  }
  await takeCountersAlong(source, target, bucket);
  await putOutOfReach(source, bucket);
  await source.query('UNLOCK TABLES');
  await leadTo(bucket, to);
  const heldMs = performance.now() - startedMs;
  await source.query(dropBucketText(bucket));
  return heldMs;
}

/** Ids go on where they were, so that none that somebody has read comes a second time. */
async function takeCountersAlong(source: Connection, target: Connection, bucket: number): Promise<void> {
  const table = bucketTable('dirty_marks', bucket);
  const [[row]] = await source.query<RowDataPacket[]>(`SHOW CREATE TABLE ${table}`);
  const next = / AUTO_INCREMENT=(\d+)/.exec(String(row?.['Create Table']))?.[1];
  if (next !== undefined) await target.query(`ALTER TABLE ${table} AUTO_INCREMENT = ${next}`);
}

/** All kinds at once: nobody sees a bucket half here and half there. */
async function leadTo(bucket: number, to: DataServer): Promise<void> {
  const places = await placesOfBuckets();
  const linkOf = (at: number) => linkName(at === bucket ? to : (places[at] as DataServer));
  const changed = [];
  for (const kind of KINDS) changed.push({ kind, created: await definitionOf(db(), kind), serverOf: linkOf });
  await replaceLinks(db(), changed);
}

/** What a move that was broken off after the switch has left. */
async function dropElsewhere(bucket: number, owner: DataServer): Promise<void> {
  for (const server of dataServers().filter(({ name }) => name !== owner.name)) {
    const connection = await connectTo(server).catch(() => null);
    await connection?.query(dropBucketText(bucket));
    await connection?.end();
  }
}

/** Moves every bucket of a server to the others, round and round. */
export async function emptyServer(from: DataServer, tell: (line: string) => void): Promise<void> {
  const others = dataServers().filter(({ name }) => name !== from.name);
  if (others.length === 0) throw new Error('There is no other data server.');
  const places = await placesOfBuckets();
  for (let bucket = 0; bucket < BUCKETS; bucket += 1) {
    if (places[bucket]?.name !== from.name) continue;
    const to = others[bucket % others.length] as DataServer;
    const heldMs = await moveBucket(bucket, to);
    tell(`bucket ${bucket}: ${from.name} → ${to.name}, held ${Math.round(heldMs)} ms`);
  }
}
