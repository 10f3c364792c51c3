import { pool, type Connection } from '#db/queries/connection';
import { listLimitVersions } from '#db/queries/limits';
import { listStationGroups } from '#db/queries/stationGroups';
import { listStations } from '#db/queries/stations';
import type { StationGroupView } from '#lib/contracts/stationGroups';
import { byLimit } from '../limits/force';
import { livingVersions } from '../limits/regroup';

/** Groups of a network by name, each with the limits on it. */
export async function readStationGroups(
  networkId: number,
  conn: Connection = pool(),
): Promise<StationGroupView[]> {
  const groups = await listStationGroups(networkId, conn);
  const codes = new Map((await listStations(networkId, conn)).map(({ id, code }) => [id, code]));
  const nowSec = Math.floor(Date.now() / 1000);
  const living = [...byLimit(await listLimitVersions(networkId, conn)).values()].map((ofLimit) =>
    livingVersions(ofLimit, nowSec),
  );
  return groups.map(({ id, name, stationIds, changedAt, changedByName }) => ({
    id,
    name,
    stations: stationIds.map((stationId) => codes.get(stationId) ?? String(stationId)).sort(),
    changedAt: changedAt.toISOString(),
    changedBy: changedByName,
    limits: living.flatMap((versions) => {
      const on = versions.find(({ groupId }) => groupId === id);
      return on ? [{ id: on.limitId, name: on.name }] : [];
    }),
  }));
}
