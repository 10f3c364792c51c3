import { inTransaction } from '#db/queries/connection';
import { nextStaged } from '#db/queries/importIntervals';
import { lockImport, updateImport, type ImportRow } from '#db/queries/imports';
import { formatInstantUtc } from '#lib/contracts/common';
import { Occupied } from '../receive/occupied';
import { storedAround } from '../receive/storedAround';

const ROWS_A_CHUNK = 5000;

/**
 * Looks whether everything that an undone import took out still has its place, before any of it is stored again. The first
 * stored interval in the way ends it: the redo is refused and nothing was changed. @returns how many rows it did.
 */
export async function redoImport(row: ImportRow, isOver: () => boolean): Promise<number> {
  for (let done = 0; ;) {
    const part = await lookChunk(row);
    if (part === 0) return done + 1;
    done += part;
    if (isOver()) return done;
  }
}

function lookChunk({ id, stationId }: ImportRow): Promise<number> {
  return inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== 'redoing') return 0;
    const staged = await nextStaged(id, row.startDone - 1, ROWS_A_CHUNK, transaction);
    const last = staged.at(-1);
    if (!last) {
      await updateImport(id, { state: 'storing' }, transaction);
      return 0;
    }
    const occupied = new Occupied();
    for (const { startSec, durationSec } of await storedAround(stationId, staged, transaction)) {
      occupied.add(startSec, startSec + durationSec);
    }
    const hindered = staged.find((one) => occupied.overlaps(one.startSec, one.startSec + one.durationSec));
    if (hindered) {
      const at = formatInstantUtc(hindered.startSec);
      const problem = `Not redone: another interval is stored where the one of ${at} was. Nothing was changed.`;
      await updateImport(id, { state: 'undone', problem, finishedAt: new Date() }, transaction);
      return 0;
    }
    await updateImport(id, { startDone: last.startSec + 1 }, transaction);
    return staged.length;
  });
}
