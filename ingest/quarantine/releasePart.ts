import type { Knex } from 'knex';
import { inTransaction } from '#db/queries/connection';
import { lockQuarantined, type LockedQuarantined } from '#db/queries/quarantine';
import { findStationById, lockStation, type StationRow } from '#db/queries/stations';
import { type RefusalCode } from '#lib/contracts/intervals';
import { readKept } from './readKept';
import { takeKept } from './takeKept';

/** What became of records of one station. */
export interface PartOutcome {
  releasedIds: number[];
  knownIds: number[];
  refused: { id: number; code: RefusalCode; detail: string }[];
}

/** Done in the same transaction with what came of it. */
type Afterwards = (outcome: PartOutcome, station: StationRow, transaction: Knex.Transaction) => Promise<void>;

/** Takes open or superseded records of a station as a post would now. */
export async function releasePart(
  stationId: number,
  ids: readonly number[],
  now: Date,
  afterwards: Afterwards,
): Promise<PartOutcome> {
  return inTransaction(async (transaction) => {
    const station = await lockedStation(stationId, transaction);
    const kept = await lockQuarantined(stationId, ids, ['open', 'superseded'], transaction);
    const outcome: PartOutcome = { releasedIds: [], knownIds: [], refused: [] };
    for (const group of await readKept(kept, station.bandFraction)) {
      const taken = await takeKept(station, group, now, transaction);
      outcome.releasedIds.push(...idsOf(taken.stored));
      outcome.knownIds.push(...idsOf(taken.known));
      for (const { kept: one, refusal } of taken.refused) {
        outcome.refused.push({ id: Number(one.id), code: refusal.code, detail: refusal.detail });
      }
    }
    await afterwards(outcome, station, transaction);
    return outcome;
  });
}

/** The station with its lock held. */
export async function lockedStation(id: number, transaction: Knex.Transaction): Promise<StationRow> {
  await lockStation(id, transaction);
  const station = await findStationById(id, transaction);
  if (!station) throw new Error(`There is no station ${id}.`);
  return station;
}

const idsOf = (records: readonly LockedQuarantined[]) => records.map(({ id }) => Number(id));
