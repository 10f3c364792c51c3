import { useQuery } from '@tanstack/react-query';
import type { UsualLevels } from '#lib/contracts/usual';
import { type Run } from '../model/runs';
import { fetchJson } from './fetchJson';
import { periodQuery } from './useStatistics';

const LONGEST_SEC = 25 * 3600;

/** What is usual for the clock window of a stretch of time; null while unknown, and for more than a day. */
export function useUsual(
  stationUrl: string,
  { fromSec, toSec }: Run,
  isSettled: boolean,
): UsualLevels | null {
  const { data } = useQuery({
    queryKey: ['usual', stationUrl, fromSec, toSec],
    queryFn: ({ signal }) =>
      fetchJson<UsualLevels>(`${stationUrl}/usual?${periodQuery({ fromSec, toSec })}`, signal),
    enabled: isSettled && toSec - fromSec <= LONGEST_SEC,
    staleTime: Infinity,
  });
  return data ?? null;
}
