import type { BandSet } from '#db/queries/bandSets';
import { noteOffset } from '#db/queries/clockOffsets';
import type { Writes } from '#db/queries/connection';
import { noteShifted } from '#db/queries/shiftedStarts';
import { noteClock } from '#db/queries/stationClocks';
import type { StationRow } from '#db/queries/stations';
import type { TokenStation } from '#db/queries/stationTokens';
import type { Receipt } from '#lib/contracts/intervals';
import { quarterAt } from '#lib/time/quarters';
import type { Decision } from './decide';
import type { Envelope } from './envelope';
import { keptRecord } from './keptRecord';
import type { Candidate, Refused } from './readRecords';
import { store } from './store';

export type ReceivingStation = Pick<StationRow, 'id' | 'bandFraction' | 'acceptsFromSec'>;

/** A post whose records have been read, each by itself. */
export interface Post {
  station: ReceivingStation;
  /** The station as it was remembered from an earlier post; null: it has just been asked for. */
  remembered: TokenStation | null;
  envelope: Envelope;
  now: Date;
  bandSet: BandSet | { problem: string };
  candidates: readonly Candidate[];
  refused: readonly Refused[];
}

/** Writes what was decided of a post (null: there was nothing to decide), and says it. */
export async function finishPost(
  { station, envelope, now, refused }: Post,
  decision: Decision | null,
  writes: Writes,
): Promise<Receipt> {
  const { intervals, bands, sentAtSec = null } = envelope;
  const judged = [...refused, ...(decision?.refused ?? [])]
    .sort((a, b) => a.index - b.index)
    .map((one) => ({ ...one, kept: keptRecord(one, intervals[one.index], bands) }));
  const kept = judged.flatMap((one) => one.kept ?? []);
  await store(station.id, decision?.accepted ?? [], kept, now, writes);
  await noteShifted(station.id, decision?.shifted ?? [], true, writes);
  if (sentAtSec !== null) await noteTime(station.id, sentAtSec, now, writes);
  return {
    accepted: decision?.accepted.length ?? 0,
    known: decision?.knownCount ?? 0,
    refused: judged.map(({ index, refusal, kept }) => ({
      index,
      code: refusal.code,
      detail: refusal.detail,
      quarantined: kept !== null,
    })),
    serverTime: now.toISOString(),
  };
}

async function noteTime(stationId: number, sentAtSec: number, now: Date, writes: Writes): Promise<void> {
  const nowSec = now.getTime() / 1000;
  const aheadSec = sentAtSec - nowSec;
  await noteClock(stationId, aheadSec, now, writes);
  await noteOffset(stationId, { quarterStartSec: quarterAt(nowSec), aheadSec }, writes);
}
