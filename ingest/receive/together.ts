import { isLockWaitOver, pool, type Writes } from '#db/queries/connection';
import { intervalsOfCells, type IntervalCells, type StoredInterval } from '#db/queries/intervalRows';
import {
  isStillSo,
  lockStationsText,
  selectIntervalsOfText,
  stationsNowText,
  type StationIntervalCells,
  type StationNowCells,
} from '#db/queries/receivingReads';
import { inReceivingTransaction, type Cells } from '#db/queries/receivingTransaction';
import type { Receipt } from '#lib/contracts/intervals';
import { decide } from './decide';
import { finishPost, type Post } from './finishPost';
import type { Outcome } from './gatherer';
import { stretchesOf } from './storedAround';

/** What was remembered of a station is no longer so: ask for it anew. Nothing was done. */
export class StaleStation extends Error {
  constructor() {
    super('The station or its token has changed.');
    this.name = 'StaleStation';
  }
}

/** What the database says of the stations of some posts. */
interface Known {
  locked: ReadonlySet<unknown>;
  now: readonly StationNowCells[];
  /** What is stored where the posts' records lie, by station; what a post adds is added. */
  stored: Map<number, StoredInterval[]>;
}

/**
 * Takes posts in one transaction of two journeys to the database; when the promise resolves, all that they brought is durable. Posts of a
 * station are taken in their order. One that meets a shift of its station's clock, or a station that somebody else has locked, is left for
 * taking alone, with nothing of it done; `isWaiting` waits for that lock.
 */
export async function takeTogether(
  posts: readonly Post[],
  { isWaiting }: { isWaiting: boolean },
): Promise<Outcome<Receipt>[]> {
  const ascending = [...posts.entries()].sort(([, a], [, b]) => a.station.id - b.station.id);
  const take = async (rows: Cells[], writes: Writes) => {
    const known = await knownOf(rows);
    const taken: Outcome<Receipt>[] = [];
    for (const [at, post] of ascending) taken[at] = await takeOne(post, known, writes);
    return taken;
  };
  try {
    return await inReceivingTransaction(readsOf(posts, isWaiting), take, { waitsOnce: !isWaiting });
  } catch (error) {
    // A data server waits even where it was asked to leave out what is locked.
    if (isWaiting || !isLockWaitOver(error)) throw error;
    return posts.map(() => ({ kind: 'alone' }));
  }
}

function readsOf(posts: readonly Post[], isWaiting: boolean): string[] {
  const ids = [...new Set(posts.map(({ station }) => station.id))].sort((a, b) => a - b);
  const tokenIds = posts.flatMap(({ remembered }) => remembered?.tokenId ?? []);
  const stretches = ids.flatMap((stationId) => {
    const own = posts.filter(({ station, bandSet }) => station.id === stationId && !('problem' in bandSet));
    const records = own.flatMap(({ candidates }) => candidates.map(({ interval }) => interval));
    return stretchesOf(records).map((stretch) => ({ stationId, ...stretch }));
  });
  return [
    lockStationsText(ids, isWaiting),
    stationsNowText(ids, tokenIds),
    ...(stretches.length > 0 ? [selectIntervalsOfText(stretches)] : []),
  ];
}

async function knownOf([locked = [], now = [], stored = []]: Cells[]): Promise<Known> {
  return {
    locked: new Set(locked.map(([id]) => id)),
    now: now as StationNowCells[],
    stored: await storedOf(stored as StationIntervalCells[]),
  };
}

/** Rows come by station; their first cells are those of an interval. */
async function storedOf(rows: readonly StationIntervalCells[]): Promise<Map<number, StoredInterval[]>> {
  const stored = new Map<number, StoredInterval[]>();
  for (const [at, interval] of (
    await intervalsOfCells(rows as unknown as IntervalCells[], pool())
  ).entries()) {
    const stationId = rows[at]?.[15] ?? NaN;
    const own = stored.get(stationId);
    if (own) own.push(interval);
    else stored.set(stationId, [interval]);
  }
  return stored;
}

async function takeOne(post: Post, known: Known, writes: Writes): Promise<Outcome<Receipt>> {
  const { station, remembered, candidates, bandSet } = post;
  if (remembered && !isStillSo(remembered, known.now)) return { kind: 'failed', error: new StaleStation() };
  if (!known.locked.has(station.id) || isShifted(station.id, known)) return { kind: 'alone' };
  if ('problem' in bandSet || candidates.length === 0) {
    return { kind: 'done', answer: await finishPost(post, null, writes) };
  }
  const stored = known.stored.get(station.id) ?? [];
  const decision = decide(candidates, { ...circumstancesOf(post), stored, bandSet });
  known.stored.set(station.id, [...stored, ...decision.accepted]);
  return { kind: 'done', answer: await finishPost(post, decision, writes) };
}

function isShifted(stationId: number, { now }: Known): boolean {
  return now.some(([id, isShiftedNow]) => id === stationId && isShiftedNow === 1);
}

/** What a post is judged by besides what is stored. */
export function circumstancesOf({ station, now }: Post) {
  return { acceptsFromSec: station.acceptsFromSec, receivedAtSec: Math.floor(now.getTime() / 1000) };
}
