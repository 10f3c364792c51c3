import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { Station } from '#lib/contracts/stations';
import { fetchJson } from '../../strip/hooks/fetchJson';
import { useLive } from '../../strip/hooks/useLive';
import { withLive } from '../model/withLive';

const EVERY_MS = 5000;
/** While levels are told as they arrive, only what else may have changed is asked for. */
const EVERY_WHILE_LIVE_MS = 15_000;

interface Answer {
  items: Station[];
}

export interface Stations {
  stations: Station[];
  /** When these were answered, epoch seconds. */
  atSec: number;
  /** Why the last attempt to renew them failed. */
  error: Error | null;
}

/** A network's stations, retired ones too, renewed as they measure, or else every five seconds; what the page brought along until then. */
export function useStations(slug: string, initial: Station[], initialAtSec: number): Stations {
  const client = useQueryClient();
  const isLive = useLive(slug, (interval) =>
    client.setQueryData<Answer>(
      ['stations', slug],
      (known) => known && { items: withLive(known.items, interval) },
    ),
  );
  const { data, dataUpdatedAt, error } = useQuery({
    queryKey: ['stations', slug],
    queryFn: ({ signal }) => fetchJson<Answer>(`/api/v1/networks/${slug}/stations`, signal),
    initialData: { items: initial },
    initialDataUpdatedAt: initialAtSec * 1000,
    refetchInterval: isLive ? EVERY_WHILE_LIVE_MS : EVERY_MS,
  });
  return { stations: data.items, atSec: dataUpdatedAt / 1000, error };
}
