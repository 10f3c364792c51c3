import type { Connection, RowDataPacket } from 'mysql2/promise';
import { db } from '#db/client';
import { connectTo, dataServers, linkName, onEach, type DataServer } from '#db/sharding/dataServers';
import { BUCKETS, bucketTable, KINDS } from '#db/sharding/kinds';
import { linkServers } from '#db/sharding/linkServers';
import { withGateClosed } from '#db/sharding/linkGate';
import { dropOldLinks, makeLinks, useLinks, type ChangedKind } from '#db/sharding/relink';
import { definitionOf } from '#db/sharding/shardTables';
import { bucketTableText, serversOfLinkTable } from '#db/sharding/texts';
import { config } from '#lib/config/index';
import { copyPart } from './copyPart';
import { beginQueue, begunFor, dropBucketText, endQueue, holdText, nextParts, partDone } from './moveQueue';
import { takeTurn } from './moveTurn';
import { bringBack, isOutOfReach, putOutOfReach } from './outOfReach';

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
 * afterwards. Every part was compared by then. Broken off, it goes on where it was when called again with the same server, and is taken back when called
 * with the server that has the bucket.
 * @returns for how long it was held, in milliseconds.
 * @throws where another move goes on, or one to another server was broken off.
 */
export async function moveBucket(bucket: number, to: DataServer): Promise<number> {
  const turn = await takeTurn();
  try {
    const from = (await placesOfBuckets())[bucket];
    if (!from) throw new Error(`There is no bucket ${bucket}.`);
    await linkServers(db(), dataServers());
    if (from.name !== to.name) return await moveFrom(from, bucket, to);
    await takeBack(bucket, to);
    return 0;
  } finally {
    await turn.end();
  }
}

async function moveFrom(from: DataServer, bucket: number, to: DataServer): Promise<number> {
  const source = await connectTo(from);
  const target = await connectTo(to, { isDatabaseThere: false });
  try {
    const begunTo = await begunFor(source, bucket);
    if (begunTo !== null && begunTo !== to.name)
      throw new Error(
        `A move of bucket ${bucket} to ${begunTo} was broken off: go on with it by moving there, or take it back by moving to ${from.name}.`,
      );
    const startedMs = performance.now();
    if (await isOutOfReach(source, bucket)) {
      await requireCopy(target, bucket, from, to);
      const links = await prepareLinks(bucket, to);
      await withGateClosed(() => useLinks(db(), links));
      const heldMs = performance.now() - startedMs;
      await dropLeft(source, bucket);
      return heldMs;
    }
    await bringBack(source, bucket);
    if (begunTo === null) {
      await makeTarget(source, target, bucket);
      await beginQueue(source, bucket, to.name);
    } else await requireCopy(target, bucket, from, to);
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

/** Parts that left the queue must still be where they were copied to. */
async function requireCopy(
  target: Connection,
  bucket: number,
  from: DataServer,
  to: DataServer,
): Promise<void> {
  await target.query(`USE \`${config().database.name}\``);
  const [rows] = await target.query<RowDataPacket[]>(
    'SELECT 1 FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name IN (?)',
    [KINDS.map((kind) => bucketTable(kind, bucket))],
  );
  if (rows.length === KINDS.length) return;
  throw new Error(
    `What was copied of bucket ${bucket} to ${to.name} is gone: take the move back by moving to ${from.name}, and begin anew.`,
  );
}

/** Makes the bucket's tables at the target anew: what may be there is of a move that came to nothing. */
async function makeTarget(source: Connection, target: Connection, bucket: number): Promise<void> {
  const { name } = config().database;
  await target.query(
    `CREATE DATABASE IF NOT EXISTS \`${name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`,
  );
  await target.query(`USE \`${name}\``);
  await target.query(dropBucketText(bucket));
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

/** Lets nobody write, holds the bucket, copies the rest, puts the old tables out of reach, leads the head to the new server, and drops them. */
async function switchOver(
  source: Connection,
  target: Connection,
  bucket: number,
  to: DataServer,
): Promise<number> {
  const links = await prepareLinks(bucket, to);
  const startedMs = performance.now();
  await withGateClosed(() => leadOver(source, target, bucket, links));
  const heldMs = performance.now() - startedMs;
  await dropLeft(source, bucket);
  return heldMs;
}

async function leadOver(
  source: Connection,
  target: Connection,
  bucket: number,
  links: readonly ChangedKind[],
): Promise<void> {
  await source.query(holdText(bucket));
  for (;;) {
    const parts = await nextParts(source, bucket, PARTS_AT_ONCE);
    if (parts.length === 0) break;
    await copyParts(source, target, bucket, parts);
  }
  await takeCountersAlong(source, target, bucket);
  await putOutOfReach(source, bucket);
  await source.query('UNLOCK TABLES');
  await useLinks(db(), links);
}

async function dropLeft(source: Connection, bucket: number): Promise<void> {
  await dropOldLinks(db());
  await source.query(dropBucketText(bucket));
}

/** Ids go on where they were, so that none that somebody has read comes a second time. */
async function takeCountersAlong(source: Connection, target: Connection, bucket: number): Promise<void> {
  const table = bucketTable('dirty_marks', bucket);
  const [[row]] = await source.query<RowDataPacket[]>(`SHOW CREATE TABLE ${table}`);
  const next = / AUTO_INCREMENT=(\d+)/.exec(String(row?.['Create Table']))?.[1];
  if (next !== undefined) await target.query(`ALTER TABLE ${table} AUTO_INCREMENT = ${next}`);
}

/** Links that lead to the new server, beside those that are used: nobody has to wait while they are made. */
async function prepareLinks(bucket: number, to: DataServer): Promise<ChangedKind[]> {
  const links: ChangedKind[] = [];
  for (const kind of KINDS) {
    const created = await definitionOf(db(), kind);
    const servers = serversOfLinkTable(created);
    servers[bucket] = linkName(to);
    links.push({ kind, created, serverOf: (at) => servers[at] ?? '' });
  }
  await makeLinks(db(), links);
  return links;
}

/** Undoes what a move that was broken off has left where the bucket is, before the switch or after it, and elsewhere. */
async function takeBack(bucket: number, owner: DataServer): Promise<void> {
  const own = await connectTo(owner);
  try {
    await bringBack(own, bucket);
    await endQueue(own, bucket);
    await dropOldLinks(db());
  } finally {
    await own.end();
  }
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
    const [begunTo] = await onEach([from], (connection) => begunFor(connection, bucket));
    const to = others.find(({ name }) => name === begunTo) ?? (others[bucket % others.length] as DataServer);
    const heldMs = await moveBucket(bucket, to);
    tell(`bucket ${bucket}: ${from.name} → ${to.name}, held ${Math.round(heldMs)} ms`);
  }
}
