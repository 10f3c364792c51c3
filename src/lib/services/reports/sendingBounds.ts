import type { Connection } from '#db/queries/connection';
import { countReportAttempts, insertReportAttempt } from '#db/queries/reports';
import { addressDigestOf } from './reportSecrets';

const HOUR_MS = 3_600_000;
const MOST_BY_ADDRESS = 6;
const MOST_BY_NETWORK = 120;

/** Where something comes from, for the bounds on how much may come. */
export interface Sender {
  networkId: number;
  address: string;
}

/** Whether one more report or addition may come within this hour: of this address, and to this network. */
export async function maySend(
  { networkId, address }: Sender,
  now: Date,
): Promise<'yes' | 'too-many' | 'busy'> {
  const since = new Date(now.getTime() - HOUR_MS);
  const { ofAddress, ofNetwork } = await countReportAttempts(networkId, addressDigestOf(address, now), since);
  if (ofAddress >= MOST_BY_ADDRESS) return 'too-many';
  return ofNetwork >= MOST_BY_NETWORK ? 'busy' : 'yes';
}

/** Counts what was taken, in its transaction. */
export async function countSent({ networkId, address }: Sender, now: Date, conn: Connection): Promise<void> {
  const keptSince = new Date(now.getTime() - HOUR_MS);
  await insertReportAttempt(networkId, addressDigestOf(address, now), keptSince, conn);
}
