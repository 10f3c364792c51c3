import type { Knex } from 'knex';
import { selectStaged } from '#db/queries/importIntervals';
import { type ImportRow } from '#db/queries/imports';
import { type StoredInterval } from '#db/queries/intervals';
import { Occupied } from '../receive/occupied';
import { type Candidate } from '../receive/readRecords';
import { storedAround } from '../receive/storedAround';

/** What is stored where the candidates lie, and what earlier rows would store there. */
export async function occupiedBy(
  { id, stationId }: ImportRow,
  candidates: readonly Candidate[],
  transaction: Knex.Transaction,
): Promise<StoredInterval[]> {
  const intervals = candidates.map(({ interval }) => interval);
  const stored = await storedAround(stationId, intervals, transaction);
  const staged = await storedAround(id, intervals, transaction, selectStaged);
  const occupied = new Occupied();
  for (const { startSec, durationSec } of stored) occupied.add(startSec, startSec + durationSec);
  // A post may have taken the place of what an earlier chunk put aside.
  const free = staged.filter(
    ({ startSec, durationSec }) => !occupied.overlaps(startSec, startSec + durationSec),
  );
  return [...stored, ...free].sort((a, b) => a.startSec - b.startSec);
}
