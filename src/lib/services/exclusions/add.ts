import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { insertExclusion, readExclusion, type Span } from '#db/queries/exclusions';
import { findStation, lockStation, type StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Exclusion } from '#lib/contracts/exclusions';
import { requireUnsealed } from '../retention/seal';
import { exclusionJson } from './exclusionJson';
import { markTouched } from './touched';

export interface ExclusionRequest extends Span {
  networkId: number;
  stationCode: string;
  reason: string;
  userId: string;
}

/**
 * Leaves a period of a station out of statistics from now on; null when the network has no such station. The data stay;
 * figures follow as quarter-hours are recomputed.
 * @throws {SealedError} for a period before the station's seal.
 */
export async function addExclusion(request: ExclusionRequest): Promise<Exclusion | null> {
  const station = await findStation(request.networkId, request.stationCode);
  if (!station) return null;
  return inTransaction((transaction) => exclude(station, request, transaction));
}

/** The same in a transaction of the caller's, where something else belongs to it. */
export async function exclude(
  station: Pick<StationRow, 'id' | 'code'>,
  { networkId, fromSec, toSec, reason, userId }: Omit<ExclusionRequest, 'stationCode'>,
  transaction: Connection,
): Promise<Exclusion> {
  await lockStation(station.id, transaction);
  await requireUnsealed(station.id, fromSec, transaction);
  const id = await insertExclusion(
    { networkId, stationId: station.id, fromSec, toSec, reason, createdBy: userId },
    transaction,
  );
  await markTouched(station.id, { fromSec, toSec }, transaction);
  await appendAudit(
    {
      userId,
      networkId,
      action: 'exclusion.add',
      subject: `station ${station.code}`,
      detail: { exclusion: id, from: formatInstantUtc(fromSec), to: formatInstantUtc(toSec), reason },
    },
    transaction,
  );
  return exclusionJson(await readExclusion(networkId, id, transaction));
}
