import { type Exclusion } from '#lib/contracts/exclusions';

/** Exclusions of a list that one act made, or one that was made alone. */
export interface ExclusionGroup {
  /** Those of one act agree in all but station and withdrawal. */
  first: Exclusion;
  members: Exclusion[];
  standing: Exclusion[];
}

/** A list's exclusions by act, in its order. */
export function groupsOf(exclusions: readonly Exclusion[]): ExclusionGroup[] {
  const groups: ExclusionGroup[] = [];
  const ofAct = new Map<number, ExclusionGroup>();
  for (const exclusion of exclusions) {
    const known = exclusion.act === null ? undefined : ofAct.get(exclusion.act);
    const group = known ?? { first: exclusion, members: [], standing: [] };
    group.members.push(exclusion);
    if (known) continue;
    groups.push(group);
    if (exclusion.act !== null) ofAct.set(exclusion.act, group);
  }
  for (const group of groups) {
    group.members.sort((a, b) => a.station.localeCompare(b.station, 'en'));
    group.standing = group.members.filter(({ withdrawal }) => withdrawal === null);
  }
  return groups;
}
