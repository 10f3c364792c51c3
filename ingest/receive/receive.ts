import type { Knex } from 'knex';
import { bandSetOf, type BandSet } from '#db/queries/bandSets';
import { inTransaction } from '#db/queries/connection';
import { noteOffset } from '#db/queries/clockOffsets';
import { noteShifted } from '#db/queries/shiftedStarts';
import { noteClock } from '#db/queries/stationClocks';
import { lockStation, type StationRow } from '#db/queries/stations';
import type { Receipt } from '#lib/contracts/intervals';
import { quarterAt } from '#lib/time/quarters';
import { clockRulesFor, possibleStretches } from './clockRules';
import { decide, type Decision } from './decide';
import type { Envelope } from './envelope';
import { keptRecord } from './keptRecord';
import { readRecords, type Candidate, type Refused } from './readRecords';
import { store } from './store';
import { storedAround } from './storedAround';

type ReceivingStation = Pick<StationRow, 'id' | 'bandFraction' | 'acceptsFromSec'>;

/**
 * Takes a post of a station: each record is accepted, known already, or refused with a reason and kept in quarantine. When the
 * promise resolves everything accepted and every record kept is durable, with marks for what must be recomputed.
 */
export async function receiveBatch(
  station: ReceivingStation,
  envelope: Envelope,
  now: Date,
): Promise<Receipt> {
  const { bandIndices, bands, intervals, sentAtSec = null } = envelope;
  const bandSet =
    'problem' in bandIndices ? bandIndices : await bandSetOf(station.bandFraction, bandIndices.indices);
  const read = readRecords(intervals, bandSet, now.getTime() / 1000);
  return inTransaction(async (transaction) => {
    const decision = await decideUnderLock(station, read.candidates, bandSet, now, transaction);
    const refused = inOrder([...read.refused, ...decision.refused]).map((one) => ({
      ...one,
      kept: keptRecord(one, intervals[one.index], bands),
    }));
    const kept = refused.flatMap((one) => one.kept ?? []);
    await store(station.id, decision.accepted, kept, now, transaction);
    await noteShifted(station.id, decision.shifted, true, transaction);
    if (sentAtSec !== null) await noteTime(station.id, sentAtSec, now, transaction);
    return {
      accepted: decision.accepted.length,
      known: decision.knownCount,
      refused: refused.map(({ index, refusal, kept }) => ({
        index,
        code: refusal.code,
        detail: refusal.detail,
        quarantined: kept !== null,
      })),
      serverTime: now.toISOString(),
    };
  });
}

async function decideUnderLock(
  { id, acceptsFromSec }: ReceivingStation,
  candidates: readonly Candidate[],
  bandSet: BandSet | { problem: string },
  now: Date,
  transaction: Knex.Transaction,
): Promise<Decision> {
  if ('problem' in bandSet || candidates.length === 0) {
    return { accepted: [], acceptedIndices: [], shifted: [], knownCount: 0, refused: [] };
  }
  await lockStation(id, transaction);
  const records = candidates.map(({ interval }) => interval);
  const clock = await clockRulesFor(id, records, transaction);
  const stored = await storedAround(id, possibleStretches(records, clock), transaction);
  const receivedAtSec = Math.floor(now.getTime() / 1000);
  return decide(candidates, { stored, bandSet, acceptsFromSec, receivedAtSec, clock });
}

async function noteTime(
  stationId: number,
  sentAtSec: number,
  now: Date,
  transaction: Knex.Transaction,
): Promise<void> {
  const nowSec = now.getTime() / 1000;
  const aheadSec = sentAtSec - nowSec;
  await noteClock(stationId, aheadSec, now, transaction);
  await noteOffset(stationId, { quarterStartSec: quarterAt(nowSec), aheadSec }, transaction);
}

function inOrder(refused: Refused[]): Refused[] {
  return refused.sort((a, b) => a.index - b.index);
}
