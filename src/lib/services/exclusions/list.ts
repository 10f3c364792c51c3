import { listExclusions, type ExclusionListQuery } from '#db/queries/exclusions';
import { listStations } from '#db/queries/stations';
import { type Exclusion } from '#lib/contracts/exclusions';
import { exclusionJson } from './exclusionJson';

export interface ExclusionPageQuery extends Omit<ExclusionListQuery, 'after'> {
  /** Sorting numbers of the last one of the page before, as its `next` gave them. */
  cursor: number[] | null;
}

/** A page of a network's exclusions, withdrawn ones too, latest beginning first; `next` is null on the last page. */
export async function exclusionPage({
  cursor,
  ...query
}: ExclusionPageQuery): Promise<{ items: Exclusion[]; next: number[] | null }> {
  const [fromSec, id] = cursor ?? [];
  const after = fromSec === undefined || id === undefined ? null : { fromSec, id };
  const rows = await listExclusions({ ...query, limit: query.limit + 1, after });
  const items = rows.slice(0, query.limit);
  const last = items.at(-1);
  const next = rows.length > query.limit && last ? [last.fromSec, last.id] : null;
  return { items: items.map(exclusionJson), next };
}

/** Stations that the list can be narrowed to, retired ones too. */
export async function exclusionStations(
  networkId: number,
): Promise<{ id: number; code: string; name: string }[]> {
  return (await listStations(networkId)).map(({ id, code, name }) => ({ id, code, name }));
}
