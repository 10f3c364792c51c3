import {
  countExceedances,
  findBeside,
  listExceedances,
  type ExceedanceCounts,
  type ExceedanceFilter,
} from '#db/queries/exceedances';
import { listStations } from '#db/queries/stations';
import type { Exceedance } from '#lib/contracts/exceedances';
import { parseInstant } from '#lib/contracts/common';
import { listLimits } from '../limits/list';
import { exceedanceView } from './view';

export type { ExceedanceCounts, ExceedanceFilter };

/** A page of a network's exceedances, latest window first; `next` holds the sorting numbers of its last one, or null. */
export async function exceedancePage(
  networkId: number,
  filter: ExceedanceFilter,
  { limit, cursor }: { limit: number; cursor: number[] | null },
): Promise<{ items: Exceedance[]; next: number[] | null }> {
  const [startsAtSec, id] = cursor ?? [];
  const after = startsAtSec === undefined || id === undefined ? null : { startsAtSec, id };
  const rows = await listExceedances(networkId, filter, { limit: limit + 1, after });
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  const next = rows.length > limit && last ? [last.startsAtSec, last.id] : null;
  return { items: items.map(exceedanceView), next };
}

/** How many exceedances stand where, whatever state and acknowledgement the filter names. */
export function exceedanceCounts(
  networkId: number,
  { fromSec, toSec, stationId, limitId }: ExceedanceFilter,
): Promise<ExceedanceCounts> {
  return countExceedances(networkId, { fromSec, toSec, stationId, limitId });
}

/** Numbers of the exceedances beside one in the list of a filter, earlier and later; null at the ends. */
export function besideExceedance(
  networkId: number,
  filter: ExceedanceFilter,
  { id, from }: Pick<Exceedance, 'id' | 'from'>,
): Promise<{ earlierId: number | null; laterId: number | null }> {
  return findBeside(networkId, filter, { id, startsAtSec: parseInstant(from) ?? 0 });
}

/** What a list of exceedances can be narrowed to. */
export interface FilterChoices {
  stations: { id: number; code: string; name: string }[];
  limits: { id: number; name: string }[];
}

export async function filterChoices(networkId: number): Promise<FilterChoices> {
  const [stations, limits] = await Promise.all([listStations(networkId), listLimits(networkId, false)]);
  return {
    stations: stations.map(({ id, code, name }) => ({ id, code, name })),
    limits: limits.map(({ id, name }) => ({ id, name })),
  };
}
