import { listLimitRecords } from '#db/queries/limits';
import { pool, type Connection } from '#db/queries/connection';
import { listStations } from '#db/queries/stations';
import type { Limit, LimitDetail } from '#lib/contracts/limits';
import { byLimit } from './force';
import { limitView, type LimitReader } from './view';

const ORDER: readonly Limit['state'][] = ['in-force', 'upcoming', 'withdrawn'];

/** Every limit of a network as it is now: those in force, those to come, withdrawn ones; each group by name. */
export async function listLimits(networkId: number, seesRecipients: boolean): Promise<Limit[]> {
  const limits = byLimit(await listLimitRecords(networkId));
  const reader = await readerOf(networkId, seesRecipients);
  return [...limits.values()]
    .map((ofLimit) => limitView(ofLimit, reader).limit)
    .sort(
      (a, b) =>
        ORDER.indexOf(a.state) - ORDER.indexOf(b.state) || a.name.localeCompare(b.name, 'en') || a.id - b.id,
    );
}

/** One limit with its versions; null when the network has none of this number. */
export async function readLimit(
  networkId: number,
  limitId: number,
  seesRecipients: boolean,
  conn: Connection = pool(),
): Promise<LimitDetail | null> {
  const ofLimit = await listLimitRecords(networkId, limitId, conn);
  if (ofLimit.length === 0) return null;
  return limitView(ofLimit, await readerOf(networkId, seesRecipients, conn));
}

async function readerOf(
  networkId: number,
  seesRecipients: boolean,
  conn: Connection = pool(),
): Promise<LimitReader> {
  const stations = await listStations(networkId, conn);
  return {
    seesRecipients,
    codes: new Map(stations.map(({ id, code }) => [id, code])),
    nowSec: Math.floor(Date.now() / 1000),
  };
}
