import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef } from 'react';
import type { LiveInterval } from '#lib/contracts/live';
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
  const isLive = useLive(
    slug,
    useGathered((intervals) =>
      client.setQueryData<Answer>(
        ['stations', slug],
        (known) => known && { items: withLive(known.items, intervals) },
      ),
    ),
  );
  const { data, dataUpdatedAt, error } = useQuery({
    queryKey: ['stations', slug],
    queryFn: ({ signal }) => fetchJson<Answer>(`/api/v1/networks/${slug}/stations`, signal),
    initialData: { items: initial },
    initialDataUpdatedAt: initialAtSec * 1000,
    staleTime: EVERY_MS,
    refetchInterval: isLive ? EVERY_WHILE_LIVE_MS : EVERY_MS,
  });
  return { stations: data.items, atSec: dataUpdatedAt / 1000, error };
}

/** At first every station tells where it stands: what comes within this makes one picture. */
const GATHER_MS = 50;

/** Gathers what is told one by one and hands it on together, shortly after the first. */
function useGathered(onIntervals: (intervals: readonly LiveInterval[]) => void): (one: LiveInterval) => void {
  const gathered = useRef<LiveInterval[]>([]);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const handOn = useRef(onIntervals);
  useEffect(() => {
    handOn.current = onIntervals;
  });
  useEffect(() => () => clearTimeout(timer.current), []);
  return useCallback((one) => {
    if (gathered.current.length === 0) {
      timer.current = setTimeout(() => handOn.current(gathered.current.splice(0)), GATHER_MS);
    }
    gathered.current.push(one);
  }, []);
}
