import type { Knex } from 'knex';
import { inTransaction } from '#db/queries/connection';
import { deleteStaged, nextStaged } from '#db/queries/importIntervals';
import { quarantineImportRefusals } from '#db/queries/importRefusals';
import { lockImport, updateImport, type ImportRow } from '#db/queries/imports';
import { type StoredInterval } from '#db/queries/intervals';
import { FLAGS } from '#lib/acoustics/validity';
import { keptInterval } from '../quarantine/keptInterval';
import { lockedStation } from '../quarantine/releasePart';
import { decide, type Decision } from '../receive/decide';
import { type KeptRecord } from '../receive/keptRecord';
import { type Candidate } from '../receive/readRecords';
import { store } from '../receive/store';
import { storedAround } from '../receive/storedAround';

const ROWS_A_CHUNK = 2000;

/**
 * Stores what the check of an import has put aside, from the earliest on, chunk by chunk as posts are stored; then keeps what the
 * check refused in quarantine. What was put aside goes in the same transaction, so nothing is stored twice or lost.
 * @returns how many rows it did.
 */
export async function storeImport(row: ImportRow, isOver: () => boolean): Promise<number> {
  for (let done = 0; ;) {
    const now = new Date();
    const part = (await storeChunk(row, now)) || (await quarantineChunk(row, now));
    if (part === 0) return done + (await finish(row.id, now));
    done += part;
    if (isOver()) return done;
  }
}

function storeChunk({ id, stationId }: ImportRow, now: Date): Promise<number> {
  return inTransaction(async (transaction) => {
    const station = await lockedStation(stationId, transaction);
    const row = await lockImport(id, transaction);
    if (row.state !== 'storing') return 0;
    const staged = await nextStaged(id, -1, ROWS_A_CHUNK, transaction);
    const [first] = staged;
    if (!first) return 0;
    const { bandSetId, bandFraction, bandIndices } = first;
    const decision = decide(staged.map(candidateOf), {
      stored: await storedAround(stationId, staged, transaction),
      bandSet: { id: bandSetId, fraction: bandFraction, indices: bandIndices },
      acceptsFromSec: station.acceptsFromSec,
      receivedAtSec: Math.floor(now.getTime() / 1000),
    });
    await store(stationId, decision.accepted, lateRefusals(decision, staged), now, transaction, id);
    await deleteStaged(id, staged.at(-1)?.startSec ?? null, ROWS_A_CHUNK, transaction);
    await count(row, decision, transaction);
    return staged.length;
  });
}

/** An interval put aside as a record of a post. */
function candidateOf(interval: StoredInterval, index: number): Candidate {
  const isLaeqComputed = (interval.flags & FLAGS.laeqComputed) !== 0;
  return {
    index,
    interval: { ...interval, flags: interval.flags & ~FLAGS.laeqComputed, isLaeqComputed },
  };
}

/** What the check accepted and cannot be stored any more, because something else came meanwhile. */
function lateRefusals({ refused }: Decision, staged: readonly StoredInterval[]): KeptRecord[] {
  return refused.flatMap(({ index, refusal: { code, detail } }) => {
    const interval = staged[index];
    return interval ? [{ code, detail, record: keptInterval(interval), startSec: interval.startSec }] : [];
  });
}

function count(row: ImportRow, decision: Decision, transaction: Knex.Transaction): Promise<void> {
  return updateImport(
    row.id,
    {
      storedCount: row.storedCount + decision.accepted.length,
      lateKnownCount: row.lateKnownCount + decision.knownCount,
      lateRefusedCount: row.lateRefusedCount + decision.refused.length,
    },
    transaction,
  );
}

function quarantineChunk({ id, stationId }: ImportRow, now: Date): Promise<number> {
  return inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== 'storing') return 0;
    return quarantineImportRefusals({ importId: id, stationId }, ROWS_A_CHUNK, now, transaction);
  });
}

function finish(id: number, now: Date): Promise<number> {
  return inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== 'storing') return 0;
    await updateImport(id, { state: 'stored', finishedAt: now }, transaction);
    return 1;
  });
}
