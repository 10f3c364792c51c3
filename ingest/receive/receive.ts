import { bandSetOf } from '#db/queries/bandSets';
import { hasStandingShiftsText } from '#db/queries/clockShifts';
import { inTransaction, pool } from '#db/queries/connection';
import { intervalsOfCells, type IntervalCells } from '#db/queries/intervalRows';
import { selectIntervalsText, type StoredInterval } from '#db/queries/intervals';
import { inReceivingTransaction, type Cells } from '#db/queries/receivingTransaction';
import { lockStation, lockStationText } from '#db/queries/stations';
import { isStillSoText, type TokenStation } from '#db/queries/stationTokens';
import type { Receipt } from '#lib/contracts/intervals';
import { clockRulesFor, possibleStretches } from './clockRules';
import { decide } from './decide';
import type { Envelope } from './envelope';
import { finishPost, type Post, type ReceivingStation } from './finishPost';
import { readRecords } from './readRecords';
import { addStretch, storedAround, stretchesOf } from './storedAround';

/** What was remembered of a station is no longer so: ask for it anew. Nothing was done. */
export class StaleStation extends Error {
  constructor() {
    super('The station or its token has changed.');
    this.name = 'StaleStation';
  }
}

/**
 * Takes a post of a station: each record is accepted, known already, or refused with a reason and kept in quarantine. When the
 * promise resolves everything accepted and every record kept is durable, with marks for what must be recomputed.
 * A station that is `remembered` by its token costs no question of its own: that it is still so is asked with the rest.
 * @throws {StaleStation} when it is not.
 */
export async function receiveBatch(
  station: ReceivingStation,
  envelope: Envelope,
  now: Date,
  remembered: TokenStation | null = null,
): Promise<Receipt> {
  const { bandIndices, intervals } = envelope;
  const bandSet =
    'problem' in bandIndices ? bandIndices : await bandSetOf(station.bandFraction, bandIndices.indices);
  const read = readRecords(intervals, bandSet, now.getTime() / 1000);
  const post = { station, remembered, envelope, now, bandSet, ...read };
  return (await receiveAtOnce(post)) ?? (await receiveThroughShifts(post));
}

/** Takes a post in two journeys to the database; null, with nothing done, where a shift of the clock stands for the station. */
async function receiveAtOnce(post: Post): Promise<Receipt | null> {
  const { station, remembered, candidates, bandSet } = post;
  const asked = remembered ? [isStillSoText(remembered)] : [];
  if ('problem' in bandSet || candidates.length === 0) {
    return inReceivingTransaction(asked, async (rows, writes) => {
      if (remembered) requireStillSo(rows[0]);
      return finishPost(post, null, writes);
    });
  }
  const stretches = stretchesOf(candidates.map(({ interval }) => interval));
  const reads = [
    lockStationText(station.id),
    hasStandingShiftsText(station.id),
    ...stretches.map(({ fromSec, toSec }) => selectIntervalsText(station.id, fromSec, toSec)),
    ...asked,
  ];
  return inReceivingTransaction(reads, async ([, shifts, ...rows], writes) => {
    if (remembered) requireStillSo(rows.pop());
    if (shifts?.length !== 0) return null;
    const stored = await intervalsOf(rows);
    return finishPost(post, decide(candidates, { ...circumstancesOf(post), stored, bandSet }), writes);
  });
}

/** Takes a post of a station some of whose intervals a shift of the clock puts elsewhere than their monitor says. */
async function receiveThroughShifts(post: Post): Promise<Receipt> {
  const { station, candidates, bandSet } = post;
  return inTransaction(async (transaction) => {
    if ('problem' in bandSet) return finishPost(post, null, transaction);
    await lockStation(station.id, transaction);
    const records = candidates.map(({ interval }) => interval);
    const clock = await clockRulesFor(station.id, records, transaction);
    const stored = await storedAround(station.id, possibleStretches(records, clock), transaction);
    const decision = decide(candidates, { ...circumstancesOf(post), stored, bandSet, clock });
    return finishPost(post, decision, transaction);
  });
}

function requireStillSo(rows: Cells | undefined): void {
  if (rows?.length !== 1) throw new StaleStation();
}

async function intervalsOf(rows: readonly Cells[]): Promise<StoredInterval[]> {
  const stored: StoredInterval[] = [];
  for (const stretch of rows) addStretch(stored, await intervalsOfCells(stretch as IntervalCells[], pool()));
  return stored;
}

function circumstancesOf({ station, now }: Post) {
  return { acceptsFromSec: station.acceptsFromSec, receivedAtSec: Math.floor(now.getTime() / 1000) };
}
