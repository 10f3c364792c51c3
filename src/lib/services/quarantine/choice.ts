import { listQuarantinedIds, stationsOfQuarantined, type QuarantineFilter } from '#db/queries/quarantine';
import { MOST_SETTLED } from '#lib/contracts/quarantine';

/** Which records an act is for: some by id, or all of a network that match. */
export type Choice = { networkId: number; ids: readonly number[] } | { filter: QuarantineFilter };

/** Records to act on, by station, each in parts that one transaction takes. */
export interface Chosen {
  parts: { stationId: number; ids: number[] }[];
  /** Ids that the network does not have. */
  unknownCount: number;
  isMoreLeft: boolean;
}

const PART = 500;

/** Finds the records of a choice, at most `MOST_SETTLED`. */
export async function choose(choice: Choice): Promise<Chosen> {
  const isById = 'ids' in choice;
  const found = isById
    ? await stationsOfQuarantined(choice.networkId, choice.ids)
    : await listQuarantinedIds(choice.filter, { limit: MOST_SETTLED + 1, afterId: 0 });
  const taken = found.slice(0, MOST_SETTLED);
  return {
    parts: partsOf(taken),
    unknownCount: isById ? new Set(choice.ids).size - found.length : 0,
    isMoreLeft: found.length > MOST_SETTLED,
  };
}

function partsOf(found: readonly { id: number; stationId: number }[]): Chosen['parts'] {
  const byStation = new Map<number, number[]>();
  for (const { id, stationId } of found) {
    const ids = byStation.get(stationId) ?? [];
    byStation.set(stationId, ids);
    ids.push(Number(id));
  }
  const parts: Chosen['parts'] = [];
  for (const [stationId, ids] of byStation) {
    for (let first = 0; first < ids.length; first += PART) {
      parts.push({ stationId, ids: ids.slice(first, first + PART) });
    }
  }
  return parts;
}
