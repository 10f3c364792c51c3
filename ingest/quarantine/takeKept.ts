import type { Knex } from 'knex';
import { type LockedQuarantined } from '#db/queries/quarantine';
import { noteShifted } from '#db/queries/shiftedStarts';
import { type StationRow } from '#db/queries/stations';
import { clockRulesFor, possibleStretches, ShiftUnderWay, type ClockRules } from '../receive/clockRules';
import { decide } from '../receive/decide';
import { Refusal } from '../receive/parseRecord';
import { readRecords, type Candidate } from '../receive/readRecords';
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
  const clock = await clockFor(station.id, read.candidates, transaction);
  if (clock instanceof Refusal) {
    refuse(read.candidates.map(({ index }) => ({ index, refusal: clock })));
    return taken;
  }
  const stretches = possibleStretches(
    read.candidates.map(({ interval }) => interval),
    clock,
  );
  const decision = decide(read.candidates, {
    stored: await storedAround(station.id, stretches, transaction),
    bandSet,
    acceptsFromSec: station.acceptsFromSec,
    receivedAtSec: 0,
    clock,
  });
  refuse(decision.refused);
  const placeOfAccepted = new Map(decision.acceptedIndices.map((index, place) => [index, place]));
  const refusedPlaces = new Set(decision.refused.map(({ index }) => index));
  const accepted = [...decision.accepted];
  for (const { index } of read.candidates) {
    const kept = records[index];
    if (!kept || refusedPlaces.has(index)) continue;
    const place = placeOfAccepted.get(index);
    const stored = place === undefined ? undefined : accepted[place];
    if (!stored || place === undefined) {
      taken.known.push(kept);
      continue;
    }
    accepted[place] = { ...stored, receivedAtSec: Math.floor(kept.receivedAt.getTime() / 1000) };
    taken.stored.push(kept);
  }
  const receivedAtMs = Math.max(0, ...taken.stored.map(({ receivedAt }) => receivedAt.getTime()));
  await store(station.id, accepted, [], new Date(receivedAtMs), transaction);
  await noteShifted(station.id, decision.shifted, true, transaction);
  return taken;
}

/** Shifts of the clock that concern the records; a refusal of them all while one is under way. */
async function clockFor(
  stationId: number,
  candidates: readonly Candidate[],
  transaction: Knex.Transaction,
): Promise<ClockRules | Refusal | null> {
  const records = candidates.map(({ interval }) => interval);
  try {
    return await clockRulesFor(stationId, records, transaction);
  } catch (error) {
    if (error instanceof ShiftUnderWay) return new Refusal('overlap', error.message);
    throw error;
  }
}
