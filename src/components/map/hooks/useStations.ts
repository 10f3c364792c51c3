import { useQuery } from '@tanstack/react-query';
import type { Station } from '#lib/contracts/stations';
import { fetchJson } from '../../strip/hooks/fetchJson';

const EVERY_MS = 5000;

export interface Stations {
  stations: Station[];
  /** When these were answered, epoch seconds. */
  atSec: number;
  /** Why the last attempt to renew them failed. */
  error: Error | null;
}

/** A network's stations in use, renewed every five seconds; what the page brought along until then. */
export function useStations(slug: string, initial: Station[], initialAtSec: number): Stations {
  const { data, dataUpdatedAt, error } = useQuery({
    queryKey: ['stations', slug],
    queryFn: ({ signal }) => fetchJson<{ items: Station[] }>(`/api/v1/networks/${slug}/stations`, signal),
    initialData: { items: initial },
    initialDataUpdatedAt: initialAtSec * 1000,
    refetchInterval: EVERY_MS,
  });
  return { stations: data.items.filter(isInUse), atSec: dataUpdatedAt / 1000, error };
}

function isInUse({ state }: Station): boolean {
  return state !== 'retired';
}
