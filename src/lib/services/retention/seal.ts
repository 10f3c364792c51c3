import { type Connection } from '#db/queries/connection';
import { findSeal } from '#db/queries/retention';
import { formatInstantUtc } from '#lib/contracts/common';

/** What is asked for is about time whose figures are sealed, or of which single intervals are no longer kept. */
export class SealedError extends Error {
  constructor(message: string) {
    super(message);
    this.name = 'SealedError';
  }
}

/**
 * Refuses to change anything of a station before its seal. Call it with the station locked.
 * @throws {SealedError} that says until when.
 */
export async function requireUnsealed(
  stationId: number,
  fromSec: number,
  transaction: Connection,
): Promise<void> {
  refuseBefore(fromSec, (await findSeal(stationId, transaction)).sealedBeforeSec);
}

/** @throws {SealedError} for a change of time before a seal. */
export function refuseBefore(fromSec: number, sealedBeforeSec: number): void {
  if (fromSec >= sealedBeforeSec) return;
  throw new SealedError(
    `Figures before ${formatInstantUtc(sealedBeforeSec)} are sealed, because single intervals are not kept for good in this network: ` +
      'nothing before that can be changed. Nothing was changed.',
  );
}
