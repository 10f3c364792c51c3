import { pool, type Connection } from '#db/queries/connection';
import { countClosedWindows, countStandingByLimit } from '#db/queries/limitActivity';
import { listLimitRecords } from '#db/queries/limits';
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

/** How many exceedances of each limit stand whose window begins in `fromSec <= t < toSec`; limits without any are left out. */
export async function exceedancesByLimit(
  networkId: number,
  fromSec: number,
  toSec: number,
): Promise<Map<number, number>> {
  return countStandingByLimit(networkId, fromSec, toSec);
}

/** How many windows of a limit have closed and wait to be judged. */
export async function countWaitingWindows(limitId: number): Promise<number> {
  return countClosedWindows(limitId, Math.floor(Date.now() / 1000));
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
