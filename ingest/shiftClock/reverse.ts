import type { Knex } from 'knex';
import { lockClockShift, updateClockShift, type ClockShiftRow } from '#db/queries/clockShifts';
import { inTransaction } from '#db/queries/connection';
import { LONGEST_INTERVAL_SEC, selectIntervals } from '#db/queries/intervals';
import { deleteInterval, insertQuarantined } from '#db/queries/quarantine';
import {
  forgetShifted,
  moveStarts,
  nextShifted,
  selectStretches,
  type ShiftedStretch,
} from '#db/queries/shiftedStarts';
import { rederiveLatest } from '#db/queries/stationLatest';
import { lockStation } from '#db/queries/stations';
import { overlap } from '#lib/services/clockShifts/episode';
import { keptInterval } from '../quarantine/keptInterval';
import { asSent } from './asSent';
import { extentOf, markMoved, ROWS_A_CHUNK } from './chunk';

/**
 * Puts back everything that a shift moved, chunk by chunk in the order in which none meets another. What was stored meanwhile where
 * an interval goes back to is put into quarantine, as it would have been without the shift; so is what came late and was only
 * taken because of the shift. @returns how many rows it did.
 */
export async function reverseShift(shift: ClockShiftRow, isOver: () => boolean): Promise<number> {
  for (let done = 0; ;) {
    const part = await reverseChunk(shift);
    done += part;
    if (part === 0 || isOver()) return done + 1;
  }
}

function reverseChunk(shift: ClockShiftRow): Promise<number> {
  const { id, stationId, shiftSec } = shift;
  return inTransaction(async (transaction) => {
    await lockStation(stationId, transaction);
    const now = await lockClockShift(id, transaction);
    if (now.state !== 'reversing') return 0;
    const chunk = await nextShifted(shift, ROWS_A_CHUNK, transaction);
    if (chunk.length === 0) {
      await updateClockShift(id, { state: 'reversed', finishedAt: new Date() }, transaction);
      return 0;
    }
    const aside = await makeWay(shift, chunk, transaction);
    const starts = chunk.map(({ startSec }) => startSec).filter((startSec) => !aside.has(startSec));
    await moveStarts(stationId, starts, -shiftSec, transaction);
    await forgetShifted(stationId, starts, transaction);
    await markMoved(stationId, chunk, -shiftSec, transaction);
    await rederiveLatest(stationId, transaction);
    const movedCount = Math.max(0, now.movedCount - chunk.filter(({ isLate }) => isLate === 0).length);
    await updateClockShift(id, { movedCount, asideCount: now.asideCount + aside.size }, transaction);
    return chunk.length;
  });
}

/** Puts into quarantine what is in the way. @returns stored starts of what was. */
async function makeWay(
  { id, stationId, shiftSec }: ClockShiftRow,
  chunk: readonly ShiftedStretch[],
  transaction: Knex.Transaction,
): Promise<Set<number>> {
  const { fromSec, toSec } = extentOf(chunk, -shiftSec);
  const around = await selectStretches(stationId, fromSec - LONGEST_INTERVAL_SEC, toSec, transaction);
  const others = around.filter(({ shiftId }) => shiftId !== id);
  const aside = new Set<number>();
  if (others.length === 0) return aside;
  for (const own of chunk) {
    const back = { startSec: own.startSec - shiftSec, durationSec: own.durationSec };
    const inTheWay = others.filter((other) => !aside.has(other.startSec) && overlap(other, back));
    if (inTheWay.length === 0) continue;
    for (const { startSec } of own.isLate === 1 ? [own] : inTheWay) {
      await putAside(stationId, startSec, transaction);
      aside.add(startSec);
    }
  }
  return aside;
}

async function putAside(stationId: number, startSec: number, transaction: Knex.Transaction): Promise<void> {
  const around = await selectIntervals(stationId, startSec, startSec + 1, transaction);
  const interval = around.find((one) => one.startSec === startSec);
  if (!interval) return;
  const sent = await asSent(stationId, interval, transaction);
  const detail = 'Stored while a shift of the clock stood; another interval went back to this time.';
  const record = { code: 'conflict', detail, record: keptInterval(sent), startSec: sent.startSec };
  await insertQuarantined(stationId, [record], new Date(interval.receivedAtSec * 1000), transaction);
  await deleteInterval(stationId, startSec, transaction);
  await forgetShifted(stationId, [startSec], transaction);
  await markMoved(stationId, [interval], 0, transaction);
}
