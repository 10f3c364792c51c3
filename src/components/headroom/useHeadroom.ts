import { useQuery } from '@tanstack/react-query';
import type { Headroom } from '#lib/contracts/headroom';
import { fetchJson } from '../strip/hooks/fetchJson';

const EVERY_MS = 60_000;

/** A station's headroom, anew every minute. */
export function useHeadroom(slug: string, code: string) {
  const url = `/api/v1/networks/${slug}/stations/${encodeURIComponent(code)}/headroom`;
  return useQuery({
    queryKey: ['headroom', url],
    queryFn: ({ signal }) => fetchJson<Headroom>(url, signal),
    refetchInterval: EVERY_MS,
  });
}
