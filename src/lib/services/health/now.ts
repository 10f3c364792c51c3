import { listOpenTroubles, listTroubles, type TroubleListQuery } from '#db/queries/health';
import { selectQuarterEvidence } from '#db/queries/healthEvidence';
import { listClocks } from '#db/queries/stationClocks';
import { listLatest } from '#db/queries/stationLatest';
import { listStations } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { type StationHealth, type Trouble } from '#lib/contracts/health';
import { quarterAt } from '#lib/time/quarters';
import { stationState } from '../stations/state';
import { kindOf, troubleJson, worstFirst } from './troubleJson';

const DAY_SEC = 86_400;

export interface NetworkHealth {
  /** Stations in use, by code. */
  stations: StationHealth[];
  /** Not over, worst first. */
  troubles: Trouble[];
}

/** How a network's stations are, as the worker found it last. */
export async function healthNow(networkId: number, nowSec: number): Promise<NetworkHealth> {
  const [stations, latest, clocks, troubles] = await Promise.all([
    listStations(networkId),
    listLatest(networkId),
    listClocks(networkId),
    listOpenTroubles(networkId),
  ]);
  const endSec = quarterAt(nowSec);
  const inUse = stations.filter(({ retiredAt }) => retiredAt === null);
  return {
    troubles: troubles.map(troubleJson).sort(worstFirst),
    stations: await Promise.all(
      inUse.map(async (station): Promise<StationHealth> => {
        const newest = latest.find(({ stationId }) => stationId === station.id);
        const quarters = await selectQuarterEvidence(station.id, endSec - DAY_SEC, endSec);
        const receivedSec = quarters.reduce((sum, one) => sum + one.validSec + one.excludedSec, 0);
        return {
          station: station.code,
          name: station.name,
          state: stationState(station, newest, nowSec),
          newestEnd: newest ? formatInstantUtc(newest.startSec + newest.durationSec) : null,
          lastPost: newest?.receivedAt.toISOString() ?? null,
          received24h: Math.min(1, receivedSec / DAY_SEC),
          battery: newest?.batteryV ?? null,
          clockAhead: clocks.find(({ stationId }) => stationId === station.id)?.aheadSec ?? null,
          troubles: troubles.filter(({ stationId }) => stationId === station.id).map(kindOf),
        };
      }),
    ),
  };
}

export interface TroublePageQuery extends Omit<TroubleListQuery, 'after'> {
  /** Sorting numbers of the last one of the page before, as its `next` gave them. */
  cursor: number[] | null;
}

/** A page of a network's troubles, over or not, latest beginning first; `next` is null on the last page. */
export async function troublePage({
  cursor,
  ...query
}: TroublePageQuery): Promise<{ items: Trouble[]; next: number[] | null }> {
  const [beginsAtSec, id] = cursor ?? [];
  const after = beginsAtSec === undefined || id === undefined ? null : { beginsAtSec, id };
  const rows = await listTroubles({ ...query, limit: query.limit + 1, after });
  const items = rows.slice(0, query.limit);
  const last = items.at(-1);
  const next = rows.length > query.limit && last ? [last.beginsAtSec, last.id] : null;
  return { items: items.map(troubleJson), next };
}
