import { useQuery } from '@tanstack/react-query';
import { formatInstantUtc } from '#lib/contracts/instants';
import type { NetworkLevels } from '#lib/contracts/networkMap';
import { fetchJson } from '../../strip/hooks/fetchJson';
import { type DayOfQuarters } from '../model/day';

const EVERY_MS = 60_000;

/** The levels of a day of the whole network in one request; nothing is asked for without a day. */
export function usePast(slug: string, day: DayOfQuarters | null) {
  return useQuery({
    queryKey: ['levels', slug, day?.fromSec, day?.toSec],
    enabled: day !== null && day.toSec > day.fromSec,
    queryFn: ({ signal }) => {
      const { fromSec, toSec } = day ?? { fromSec: 0, toSec: 0 };
      const query = new URLSearchParams({ from: formatInstantUtc(fromSec), to: formatInstantUtc(toSec) });
      return fetchJson<NetworkLevels>(`/api/v1/networks/${slug}/levels?${query.toString()}`, signal);
    },
    staleTime: EVERY_MS,
    refetchInterval: day?.isToday === true ? EVERY_MS : false,
    // At the turn of a quarter-hour the day so far goes on being shown.
    placeholderData: (before) => (before?.from === formatInstantUtc(day?.fromSec ?? 0) ? before : undefined),
  });
}
