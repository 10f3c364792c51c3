import { useQuery } from '@tanstack/react-query';
import { formatInstantUtc } from '#lib/contracts/instants';
import type { Statistics } from '#lib/contracts/levels';
import { type Run } from '../model/runs';
import { fetchJson } from './fetchJson';
import { LIVE_EVERY_MS } from './useColumns';

/** `from` and `to` of a request in the interface's own form. */
export function periodQuery({ fromSec, toSec }: Run): string {
  return new URLSearchParams({ from: formatInstantUtc(fromSec), to: formatInstantUtc(toSec) }).toString();
}

/**
 * The server's figures of a stretch of time; asked for only once `isSettled`, and again while the stretch is not over. `known`:
 * figures that came with the page, which need not be asked for where they are of that stretch.
 */
export function useStatistics(
  stationUrl: string,
  run: Run,
  isSettled: boolean,
  nowSec: number,
  known: Statistics | undefined,
) {
  const fromSec = Math.floor(run.fromSec);
  const toSec = Math.ceil(run.toSec);
  const isKnown = known?.from === formatInstantUtc(fromSec) && known.to === formatInstantUtc(toSec);
  const isLive = toSec > nowSec - 120;
  return useQuery({
    queryKey: ['statistics', stationUrl, fromSec, toSec],
    queryFn: ({ signal }) =>
      fetchJson<Statistics>(`${stationUrl}/statistics?${periodQuery({ fromSec, toSec })}`, signal),
    enabled: isSettled,
    initialData: isKnown ? known : undefined,
    staleTime: isLive ? LIVE_EVERY_MS : 10 * 60_000,
    refetchInterval: isLive ? LIVE_EVERY_MS : false,
  });
}
