import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findStationById, insertStation, type StationRow } from '#db/queries/stations';
import { insertStationToken } from '#db/queries/stationTokens';
import { bandRange } from '#lib/acoustics/bands';
import { flagMask } from '#lib/acoustics/validity';
import { type NewStation } from '#lib/contracts/stations';
import { isDuplicateKey } from '../duplicateKey';

export type Registration =
  { outcome: 'registered'; station: StationRow; token: string } | { outcome: 'code-taken' };

/** Adds a station with its first token, told this once: all of it with its audit entry, or nothing. */
export async function registerStation(
  networkId: number,
  input: NewStation,
  userId: string,
): Promise<Registration> {
  const bands = bandRange(input.bandFraction, input.firstBandHz, input.lastBandHz);
  const row = {
    networkId,
    code: input.code,
    name: input.name,
    latitude: input.latitude,
    longitude: input.longitude,
    bandFraction: input.bandFraction,
    intervalSec: input.intervalSeconds,
    firstBandIndex: bands[0]?.index ?? 0,
    lastBandIndex: bands.at(-1)?.index ?? 0,
    placement: input.placement,
    facadeCorrectionDb: input.facadeCorrection,
    mastHeightM: input.mastHeight,
    surroundings: input.surroundings,
    acceptsFromSec: input.acceptsFrom,
    expectedFlags: flagMask(input.expectedFlags),
  };
  try {
    return await inTransaction(async (transaction) => {
      const id = await insertStation(row, transaction);
      const token = await insertStationToken(id, userId, transaction);
      const station = await findStationById(id, transaction);
      if (!station) throw new Error('The station just added cannot be read.');
      const subject = `station ${input.code}`;
      await appendAudit(
        { userId, networkId, action: 'station.register', subject, detail: { after: row } },
        transaction,
      );
      return { outcome: 'registered', station, token };
    });
  } catch (error) {
    if (isDuplicateKey(error)) return { outcome: 'code-taken' };
    throw error;
  }
}
