import type { Knex } from 'knex';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import {
  deleteInterval,
  insertSuperseded,
  lockQuarantined,
  settleQuarantined,
  stationsOfQuarantined,
} from '#db/queries/quarantine';
import { forgetShifted } from '#db/queries/shiftedStarts';
import { rederiveLatest } from '#db/queries/stationLatest';
import { parseInstant } from '#lib/contracts/common';
import { type ReleaseOutcome } from '#lib/contracts/quarantine';
import { quartersTouching } from '#lib/time/quarters';
import { clockRulesFor, placesOf } from '../receive/clockRules';
import { asSent } from '../shiftClock/asSent';
import { keptInterval } from './keptInterval';
import { readKept, type KeptGroup } from './readKept';
import { lockedStation } from './releasePart';
import { takeKept, type Taken } from './takeKept';

interface Replacing {
  userId: string;
  networkId: number;
  reason: string;
}

/**
 * Releases one record in place of the stored interval of the same start, which is kept in quarantine as superseded and can be
 * put back the same way. Where the record cannot be taken all the same, the stored interval stays.
 */
export async function replaceStored(id: number, replacing: Replacing, now: Date): Promise<ReleaseOutcome> {
  const [found] = await stationsOfQuarantined(replacing.networkId, [id]);
  if (!found) return outcomeOf(id, null);
  try {
    return await inTransaction(async (transaction) => {
      const station = await lockedStation(found.stationId, transaction);
      const kept = await lockQuarantined(station.id, [id], ['open', 'superseded'], transaction);
      const [group] = await readKept(kept, station.bandFraction);
      if (!group) return outcomeOf(id, null);
      let taken = await takeKept(station, group, now, transaction);
      let displaced: number | null = null;
      if (taken.refused[0]?.refusal.code === 'conflict') {
        displaced = await displace(station.id, id, group, replacing, transaction);
        taken = await takeKept(station, group, now, transaction);
        await rederiveLatest(station.id, transaction);
      }
      // What was put aside for nothing goes back with the transaction.
      if (taken.refused.length > 0) throw new NotTaken(taken);
      const { userId, networkId, reason } = replacing;
      await settleQuarantined([id], { as: 'released', by: userId, reason }, transaction);
      const subject = `station ${station.code}`;
      const detail = { record: id, superseded: displaced, reason };
      await appendAudit({ userId, networkId, action: 'quarantine.replace', subject, detail }, transaction);
      return outcomeOf(id, taken);
    });
  } catch (error) {
    if (error instanceof NotTaken) return outcomeOf(id, error.taken);
    throw error;
  }
}

class NotTaken extends Error {
  constructor(readonly taken: Taken) {
    super('The record was not taken.');
  }
}

/** Moves the stored interval of the record's start into quarantine. @returns its id there, or null when there is none. */
async function displace(
  stationId: number,
  byRecord: number,
  { intervals: [record] }: KeptGroup,
  { userId, reason }: Replacing,
  transaction: Knex.Transaction,
): Promise<number | null> {
  const start: unknown = (record as { start?: unknown } | null)?.start;
  const startSec = typeof start === 'string' ? parseInstant(start) : null;
  const stored = startSec === null ? undefined : await storedFor(stationId, startSec, transaction);
  if (!stored) return null;
  const sent = await asSent(stationId, stored, transaction);
  const displaced = await insertSuperseded(
    stationId,
    {
      detail: `Stored until record ${byRecord} of the quarantine replaced it.`,
      record: keptInterval(sent),
      startSec: sent.startSec,
    },
    { by: userId, reason, receivedAt: new Date(stored.receivedAtSec * 1000) },
    transaction,
  );
  await deleteInterval(stationId, stored.startSec, transaction);
  await forgetShifted(stationId, [stored.startSec], transaction);
  const quarters = quartersTouching(stored.startSec, stored.startSec + stored.durationSec);
  await insertDirtyMarks(stationId, quarters, transaction);
  return displaced;
}

/** The stored interval where a record that a monitor sent with `sentSec` belongs. */
async function storedFor(
  stationId: number,
  sentSec: number,
  transaction: Knex.Transaction,
): Promise<StoredInterval | undefined> {
  const sent = { startSec: sentSec, durationSec: 1 };
  const [place] = placesOf(sent, await clockRulesFor(stationId, [sent], transaction));
  const startSec = place?.startSec ?? sentSec;
  const around = await selectIntervals(stationId, startSec, startSec + 1, transaction);
  return around.find((interval) => interval.startSec === startSec);
}

function outcomeOf(id: number, taken: Taken | null): ReleaseOutcome {
  const refused = taken?.refused ?? [];
  return {
    released: taken?.stored.length ?? 0,
    known: taken?.known.length ?? 0,
    refused: refused.map(({ refusal: { code, detail } }) => ({ id, code, detail })),
    refusedCount: refused.length,
    passedOver: taken ? 0 : 1,
    isMoreLeft: false,
  };
}
