import { inTransaction } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { nextStoredOf, unstore } from '#db/queries/importIntervals';
import { unquarantineOfImport } from '#db/queries/importRefusals';
import { lockImport, updateImport, type ImportRow } from '#db/queries/imports';
import { rederiveLatest } from '#db/queries/stationLatest';
import { lockStation } from '#db/queries/stations';
import { quartersTouching } from '#lib/time/quarters';

const ROWS_A_CHUNK = 2000;

/**
 * Takes out exactly the intervals that an import added and that are still stored, chunk by chunk with marks for what must be
 * recomputed, and the records that it brought to quarantine and nobody has settled. All of it is put aside for a redo.
 * @returns how many rows it did.
 */
export async function undoImport(row: ImportRow, isOver: () => boolean): Promise<number> {
  for (let done = 0; ;) {
    const part = (await undoChunk(row)) || (await unquarantineChunk(row.id));
    if (part === 0) return done + (await finish(row.id));
    done += part;
    if (isOver()) return done;
  }
}

function undoChunk({ id, stationId }: ImportRow): Promise<number> {
  return inTransaction(async (transaction) => {
    await lockStation(stationId, transaction);
    const row = await lockImport(id, transaction);
    if (row.state !== 'undoing') return 0;
    const stretches = await nextStoredOf(id, stationId, row.startDone - 1, ROWS_A_CHUNK, transaction);
    const [first, last] = [stretches[0], stretches.at(-1)];
    if (!first || !last) return 0;
    await unstore(id, stationId, { fromSec: first.startSec, toSec: last.startSec }, transaction);
    const quarters = stretches.flatMap(({ startSec, durationSec }) =>
      quartersTouching(startSec, startSec + durationSec),
    );
    await insertDirtyMarks(stationId, new Set(quarters), transaction);
    await rederiveLatest(stationId, transaction);
    const storedCount = row.storedCount - stretches.length;
    await updateImport(id, { startDone: last.startSec + 1, storedCount }, transaction);
    return stretches.length;
  });
}

function unquarantineChunk(id: number): Promise<number> {
  return inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    return row.state === 'undoing' ? unquarantineOfImport(id, ROWS_A_CHUNK, transaction) : 0;
  });
}

function finish(id: number): Promise<number> {
  return inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== 'undoing') return 0;
    await updateImport(
      id,
      { state: 'undone', storedCount: 0, lateKnownCount: 0, lateRefusedCount: 0, finishedAt: new Date() },
      transaction,
    );
    return 1;
  });
}
