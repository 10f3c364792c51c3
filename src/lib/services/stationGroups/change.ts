import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { listLimitVersions } from '#db/queries/limits';
import {
  deleteStationGroup,
  insertStationGroup,
  listStationGroups,
  lockStationGroups,
  updateStationGroup,
  type StationGroup,
} from '#db/queries/stationGroups';
import { listStations, type StationRow } from '#db/queries/stations';
import type { NewStationGroup, StationGroupView } from '#lib/contracts/stationGroups';
import { isDuplicateKey } from '../duplicateKey';
import { regroupLimits } from '../limits/regroup';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { readStationGroups } from './list';

/** Who changes groups where. */
interface Actor {
  userId: string;
  networkId: number;
}

/** So that each transaction sees what those before it committed, once it holds the locks. */
const ISOLATION = { isolationLevel: 'read committed' } as const;
const NO_GROUP = 'The network has no group with this number.';

/** Makes a group of stations. */
export function addStationGroup(actor: Actor, group: NewStationGroup): Promise<Outcome<StationGroupView>> {
  return changing(actor, group, async (stationIds, transaction) => {
    const fields = { name: group.name, stationIds, changedBy: actor.userId };
    const id = await insertStationGroup(actor.networkId, fields, transaction);
    await audit(actor, 'station-group.add', id, { ...group }, transaction);
    return viewOf(actor.networkId, id, transaction);
  });
}

/** Changes a group's name or stations. Limits on it hold for its stations of now in windows that begin from now on. */
export function changeStationGroup(
  actor: Actor,
  groupId: number,
  group: NewStationGroup,
): Promise<Outcome<StationGroupView>> {
  return changing(actor, group, async (stationIds, transaction) => {
    const before = await lockedGroup(actor.networkId, groupId, transaction);
    if (!before) return unknown(NO_GROUP);
    const isSame = before.stationIds.join() === stationIds.join();
    if (isSame && before.name === group.name) return viewOf(actor.networkId, groupId, transaction);
    const fields = { name: group.name, stationIds, changedBy: actor.userId };
    await updateStationGroup(groupId, fields, transaction);
    const { networkId, userId } = actor;
    const regrouped = { id: groupId, name: group.name, stationIds };
    const limits = isSame ? [] : await regroupLimits(networkId, regrouped, userId, transaction);
    const detail = {
      before: { name: before.name, stationIds: before.stationIds },
      ...group,
      stationIds,
      limits,
    };
    await audit(actor, 'station-group.change', groupId, detail, transaction);
    return viewOf(networkId, groupId, transaction);
  });
}

/** Deletes a group that no version of a limit names. */
export function removeStationGroup(actor: Actor, groupId: number): Promise<Outcome<null>> {
  return inTransaction(async (transaction) => {
    const group = await lockedGroup(actor.networkId, groupId, transaction);
    if (!group) return unknown(NO_GROUP);
    const versions = await listLimitVersions(actor.networkId, transaction);
    const on = versions.find((version) => version.groupId === groupId);
    if (on) {
      const detail = `“${on.name}” applies to this group, or did: it stays, so that the limit’s record can be read. Nothing was changed.`;
      return { kind: 'before' as const, code: 'group-in-use', detail };
    }
    await deleteStationGroup(groupId, transaction);
    await audit(actor, 'station-group.delete', groupId, { name: group.name }, transaction);
    return done(null);
  }, ISOLATION);
}

async function changing(
  { networkId }: Actor,
  { name, stations: codes }: NewStationGroup,
  change: (stationIds: number[], transaction: Connection) => Promise<Outcome<StationGroupView>>,
): Promise<Outcome<StationGroupView>> {
  try {
    return await inTransaction(async (transaction) => {
      const stations = await listStations(networkId, transaction);
      const chosen = codes.map((code) => stations.find((station) => station.code === code));
      const missing = codes.filter((_, at) => !chosen[at]);
      if (missing.length > 0) return invalid('stations', `${missing.join(', ')}: no station of this network`);
      return change(idsOf(chosen), transaction);
    }, ISOLATION);
  } catch (error) {
    if (!isDuplicateKey(error)) throw error;
    return invalid('name', `must be another one: there is a group “${name}” already`);
  }
}

function idsOf(stations: readonly (StationRow | undefined)[]): number[] {
  const ids = stations.flatMap((station) => (station ? [station.id] : []));
  return [...new Set(ids)].sort((a, b) => a - b);
}

async function lockedGroup(
  networkId: number,
  groupId: number,
  transaction: Connection,
): Promise<StationGroup | undefined> {
  await lockStationGroups(networkId, transaction);
  return (await listStationGroups(networkId, transaction)).find(({ id }) => id === groupId);
}

async function viewOf(
  networkId: number,
  groupId: number,
  transaction: Connection,
): Promise<Outcome<StationGroupView>> {
  const group = (await readStationGroups(networkId, transaction)).find(({ id }) => id === groupId);
  return group ? done(group) : unknown(NO_GROUP);
}

function audit(
  { userId, networkId }: Actor,
  action: string,
  groupId: number,
  detail: Record<string, unknown>,
  transaction: Connection,
): Promise<void> {
  return appendAudit({ userId, networkId, action, subject: `station group ${groupId}`, detail }, transaction);
}
