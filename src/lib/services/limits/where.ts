import type { StationGroup } from '#db/queries/stationGroups';
import type { StationRow } from '#db/queries/stations';
import { bandLabel, type Band } from '#lib/acoustics/bands';
import type { NewLimit } from '#lib/contracts/limits';
import { measures } from './measures';
import type { FieldProblem } from './rule';

/** What a network has that a limit may name. */
export interface LimitPlaces {
  stations: readonly StationRow[];
  groups: readonly StationGroup[];
}

export interface LimitWhere {
  /** Null: every station of the network. */
  stationIds: number[] | null;
  groupId: number | null;
}

/** Where a limit holds: everywhere, at the stations that it names, or at those of its group; `bands` are those that it is about. */
export function whereOf(
  { stations: named, group: groupId }: Pick<NewLimit, 'stations' | 'group'>,
  bands: readonly Band[],
  { stations, groups }: LimitPlaces,
): LimitWhere | FieldProblem[] {
  if (groupId !== null) {
    const group = groups.find(({ id }) => id === groupId);
    if (!group) return [{ field: 'group', message: 'must be a group of this network' }];
    return { groupId, stationIds: group.stationIds };
  }
  if (named === null) return { groupId, stationIds: null };
  const codes = [...new Set(named)].sort();
  const chosen = codes.map((code) => stations.find((station) => station.code === code));
  const unknown = codes.filter((_, at) => !chosen[at]);
  const known = chosen.filter((station) => station !== undefined);
  const without = known.filter((station) => bands.some((band) => !measures(station, band)));
  const problems: FieldProblem[] = [];
  if (unknown.length > 0)
    problems.push({ field: 'stations', message: `${unknown.join(', ')}: no station of this network` });
  if (without.length > 0) {
    const list = without.map(({ code }) => code).join(', ');
    problems.push({ field: 'stations', message: `${list}: not measured there, the ${bandsWords(bands)}` });
  }
  return problems.length > 0 ? problems : { groupId, stationIds: known.map(({ id }) => id) };
}

/** "100 Hz third", "50 Hz to 200 Hz thirds". */
function bandsWords(bands: readonly Band[]): string {
  const kind = bands[0]?.fraction === 3 ? 'third' : 'octave';
  return `${bands.map(bandLabel).join(' to ')} ${kind}${bands.length > 1 ? 's' : ''}`;
}
