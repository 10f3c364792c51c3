import { useQuery } from '@tanstack/react-query';
import { formatInstantUtc } from '#lib/contracts/instants';
import type { Trouble } from '#lib/contracts/health';
import { fetchJson } from '../../strip/hooks/fetchJson';

const EVERY_MS = 60_000;

/** What is wrong with a station at the moment, latest beginning first. */
export function useTroubles(slug: string, code: string) {
  return useQuery({
    queryKey: ['troubles', slug, code],
    queryFn: async ({ signal }) => {
      const nowSec = Math.floor(Date.now() / 1000);
      const query = new URLSearchParams({
        station: code,
        from: formatInstantUtc(nowSec - 60),
        to: formatInstantUtc(nowSec),
      });
      const url = `/api/v1/networks/${slug}/health/troubles?${query.toString()}`;
      const { items } = await fetchJson<{ items: Trouble[] }>(url, signal);
      return items.filter(({ until }) => until === null);
    },
    refetchInterval: EVERY_MS,
  });
}
