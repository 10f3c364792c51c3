import type { Knex } from 'knex';
import { type StoredInterval } from '#db/queries/intervals';
import { type LockedQuarantined } from '#db/queries/quarantine';
import { type StationRow } from '#db/queries/stations';
import { decide } from '../receive/decide';
import { type Refusal } from '../receive/parseRecord';
import { readRecords } from '../receive/readRecords';
import { store } from '../receive/store';
import { storedAround } from '../receive/storedAround';
import { type KeptGroup } from './readKept';

/** What became of each record of a group. */
export interface Taken {
  stored: LockedQuarantined[];
  known: LockedQuarantined[];
  refused: { kept: LockedQuarantined; refusal: Refusal }[];
}

/** Stores what of a group can be taken now, as received when it was first received. The station is locked. */
export async function takeKept(
  station: StationRow,
  { bandSet, records, intervals }: KeptGroup,
  now: Date,
  transaction: Knex.Transaction,
): Promise<Taken> {
  const taken: Taken = { stored: [], known: [], refused: [] };
  const refuse = (refused: { index: number; refusal: Refusal }[]) => {
    for (const { index, refusal } of refused) {
      const kept = records[index];
      if (kept) taken.refused.push({ kept, refusal });
    }
  };
  const read = readRecords(intervals, bandSet, now.getTime() / 1000);
  refuse(read.refused);
  if ('problem' in bandSet) return taken;
  const stored = await storedAround(
    station.id,
    read.candidates.map(({ interval }) => interval),
    transaction,
  );
  const decision = decide(read.candidates, {
    stored,
    bandSet,
    acceptsFromSec: station.acceptsFromSec,
    receivedAtSec: 0,
  });
  refuse(decision.refused);
  const refusedPlaces = new Set(decision.refused.map(({ index }) => index));
  const accepted: StoredInterval[] = [];
  for (const { index, interval } of read.candidates) {
    const kept = records[index];
    if (!kept || refusedPlaces.has(index)) continue;
    // What is accepted keeps its order, so the next one is this record's, or this record said what was known.
    const next = decision.accepted[accepted.length];
    if (next?.startSec === interval.startSec) {
      accepted.push({ ...next, receivedAtSec: Math.floor(kept.receivedAt.getTime() / 1000) });
      taken.stored.push(kept);
    } else {
      taken.known.push(kept);
    }
  }
  const receivedAtMs = Math.max(0, ...taken.stored.map(({ receivedAt }) => receivedAt.getTime()));
  await store(station.id, accepted, [], new Date(receivedAtMs), transaction);
  return taken;
}
