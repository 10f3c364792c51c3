import { appendAudit } from '#db/queries/audit';
import { findClockShift, insertClockShift } from '#db/queries/clockShifts';
import { inTransaction, type Connection } from '#db/queries/connection';
import { isImportWorking } from '#db/queries/imports';
import { lockStation, type StationRow } from '#db/queries/stations';
import { type ClockShift, type NewClockShiftAsked } from '#lib/contracts/clockShifts';
import { formatInstantUtc } from '#lib/contracts/common';
import { done, invalid, type Outcome } from '../outcome';
import { requireUnsealed } from '../retention/seal';
import { clockShiftJson } from './clockShiftJson';
import { planShift } from './plan';
import { episodeOf } from './preview';

/** Has the worker move an episode; refused as a whole where an interval would meet one that stays. */
export async function makeShift(
  station: StationRow,
  asked: NewClockShiftAsked,
  userId: string,
  nowSec: number,
): Promise<Outcome<ClockShift>> {
  const episode = episodeOf(asked);
  return inTransaction<Outcome<ClockShift>>(async (transaction) => {
    await lockStation(station.id, transaction);
    const { fromSec, shiftSec } = episode;
    await requireUnsealed(station.id, Math.min(fromSec, fromSec + shiftSec), transaction);
    if (await isImportWorking(station.id, transaction)) {
      return invalid('from', 'must wait: a file of this station is being stored or undone');
    }
    const plan = await planShift(station.id, episode, nowSec, transaction);
    if (plan.kind !== 'done') return plan;
    const { moving, colliding } = plan.value;
    if (colliding.length > 0) {
      return invalid('shiftSeconds', `would move ${colliding.length} intervals to where others stay`);
    }
    const id = await insertClockShift(
      {
        ...episode,
        networkId: station.networkId,
        stationId: station.id,
        reason: asked.reason,
        plannedCount: moving.length,
        userId,
      },
      transaction,
    );
    await appendAudit(
      {
        userId,
        networkId: station.networkId,
        action: 'clock-shift.make',
        subject: `station ${station.code}`,
        detail: {
          shift: id,
          from: formatInstantUtc(episode.fromSec),
          to: formatInstantUtc(episode.toSec),
          shiftSeconds: episode.shiftSec,
          intervals: moving.length,
          reason: asked.reason,
        },
      },
      transaction,
    );
    return done(await readShift(station.id, id, transaction));
  });
}

/** A shift that exists. */
export async function readShift(stationId: number, id: number, conn: Connection): Promise<ClockShift> {
  const row = await findClockShift(stationId, id, conn);
  if (!row) throw new Error(`There is no clock shift ${id}.`);
  return clockShiftJson(row);
}
