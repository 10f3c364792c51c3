import type { Connection } from '#db/queries/connection';
import {
  findLimit,
  insertVersion,
  listLimitVersions,
  lockLimits,
  type LimitVersion,
} from '#db/queries/limits';
import { replacedFromSec } from './force';

/** A group whose stations have changed. */
export interface Regrouped {
  id: number;
  name: string;
  stationIds: number[];
}

/**
 * Gives each limit on a group a version with its stations of now, for windows that begin from now on; a version to come that is on it
 * follows with them when its time comes. Answers the limits' ids. Call it in the read-committed transaction of the group's change.
 */
export async function regroupLimits(
  networkId: number,
  group: Regrouped,
  userId: string,
  transaction: Connection,
): Promise<number[]> {
  const nowSec = Math.floor(Date.now() / 1000);
  const versions = await listLimitVersions(networkId, transaction);
  const named = [...new Set(versions.filter(isOn(group)).map(({ limitId }) => limitId))];
  await lockLimits(named, transaction);
  const changed: number[] = [];
  for (const limitId of named) {
    const ofLimit = await findLimit(networkId, limitId, transaction);
    const living = livingVersions(ofLimit, nowSec);
    const first = living.findIndex(isOn(group));
    if (first === -1) continue;
    changed.push(limitId);
    let number = ofLimit.at(-1)?.version ?? 0;
    // Later versions are said again after it: the newest version that has begun is the one that judges.
    for (const version of living.slice(first)) {
      number += 1;
      const next = isOn(group)(version) ? regrouped(version, group) : version;
      const effectiveFromSec = Math.max(version.effectiveFromSec, nowSec);
      await insertVersion(limitId, number, { ...next, effectiveFromSec, createdBy: userId }, transaction);
    }
  }
  return changed;
}

/** Versions of a limit that are in force or will be, in order of their beginning; none of a withdrawn limit. */
export function livingVersions<V extends LimitVersion>(ofLimit: readonly V[], nowSec: number): V[] {
  return ofLimit
    .filter((version) => version.withdrawnAt === null)
    .filter((version) => replacedFromSec(version, ofLimit) > Math.max(version.effectiveFromSec, nowSec))
    .sort((a, b) => a.effectiveFromSec - b.effectiveFromSec);
}

function isOn({ id }: Regrouped): (version: LimitVersion) => boolean {
  return ({ groupId }) => groupId === id;
}

function regrouped(version: LimitVersion, { name, stationIds }: Regrouped): LimitVersion {
  return { ...version, stationIds, reason: `The stations of the group “${name}” have changed` };
}
