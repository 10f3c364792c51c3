import type { Knex } from 'knex';
import { lockClockShift, updateClockShift, type ClockShiftRow } from '#db/queries/clockShifts';
import { inTransaction } from '#db/queries/connection';
import { LONGEST_INTERVAL_SEC } from '#db/queries/intervals';
import { moveEpisode, nextOfEpisode, noteShifted, selectStretches } from '#db/queries/shiftedStarts';
import { rederiveLatest } from '#db/queries/stationLatest';
import { lockStation } from '#db/queries/stations';
import { collisionsOf } from '#lib/services/clockShifts/episode';
import { extentOf, markMoved, ROWS_A_CHUNK } from './chunk';

/**
 * Moves the intervals of an episode chunk by chunk, the last first where they move on: each transaction leaves marks for what must
 * be recomputed and what it has moved, so that it makes no difference whether the worker went on or began again. Where one would
 * meet an interval that came meanwhile, everything goes back. @returns how many rows it did.
 */
export async function moveShift(shift: ClockShiftRow, isOver: () => boolean): Promise<number> {
  for (let done = 0; ;) {
    const part = await moveChunk(shift);
    done += part;
    if (part === 0 || isOver()) return done + 1;
  }
}

function moveChunk(shift: ClockShiftRow): Promise<number> {
  const { id, stationId, shiftSec } = shift;
  return inTransaction(async (transaction) => {
    await lockStation(stationId, transaction);
    const now = await lockClockShift(id, transaction);
    if (now.state !== 'moving') return 0;
    const chunk = await nextOfEpisode(stationId, shift, ROWS_A_CHUNK, transaction);
    if (chunk.length === 0) {
      await updateClockShift(id, { state: 'moved', finishedAt: new Date() }, transaction);
      return 0;
    }
    if (await meetsAnother(shift, chunk, transaction)) {
      const problem = 'Another interval came meanwhile where one would have been moved to. All was put back.';
      await updateClockShift(id, { state: 'reversing', problem }, transaction);
      return 0;
    }
    const starts = chunk.map(({ startSec }) => startSec);
    const bounds = { fromSec: Math.min(...starts), toSec: Math.max(...starts) + 1 };
    await moveEpisode(stationId, { ...shift, ...bounds }, transaction);
    const moved = starts.map((startSec) => ({ startSec: startSec + shiftSec, shiftId: id }));
    await noteShifted(stationId, moved, false, transaction);
    await markMoved(stationId, chunk, shiftSec, transaction);
    await rederiveLatest(stationId, transaction);
    await updateClockShift(id, { movedCount: now.movedCount + chunk.length }, transaction);
    return chunk.length;
  });
}

async function meetsAnother(
  shift: ClockShiftRow,
  chunk: readonly { startSec: number; durationSec: number }[],
  transaction: Knex.Transaction,
): Promise<boolean> {
  const { fromSec, toSec } = extentOf(chunk, shift.shiftSec);
  const around = await selectStretches(shift.stationId, fromSec - LONGEST_INTERVAL_SEC, toSec, transaction);
  const others = around.filter(({ shiftId }) => shiftId !== shift.id);
  const ascending = [...chunk].sort((a, b) => a.startSec - b.startSec);
  return collisionsOf(ascending, others, shift).length > 0;
}
