import { useQueryClient } from '@tanstack/react-query';
import { useRef } from 'react';
import { endOfColumnsSec, type StripColumns } from '../model/stripColumns';
import { useLive } from './useLive';

/** A station that measures every second has its newest columns fetched no more often than this. */
const LEAST_BETWEEN_MS = 4000;

/** Has the columns that are still being measured fetched as soon as the station has measured more; answers whether that works. */
export function useLiveColumns(slug: string, stationCode: string, stationUrl: string): boolean {
  const client = useQueryClient();
  const lastMs = useRef(0);
  const lastStart = useRef('');
  return useLive(slug, ({ code, start }) => {
    if (code !== stationCode || start <= lastStart.current) return;
    const isFirst = lastStart.current === '';
    lastStart.current = start;
    const nowMs = Date.now();
    // The first event only tells where the station stands: that has just been fetched.
    if (isFirst || nowMs - lastMs.current < LEAST_BETWEEN_MS) return;
    lastMs.current = nowMs;
    const startSec = Date.parse(start) / 1000;
    void client.invalidateQueries({
      queryKey: ['columns', stationUrl],
      predicate: ({ state }) => holds(state.data as StripColumns | undefined, startSec),
    });
  });
}

function holds(columns: StripColumns | undefined, sec: number): boolean {
  return columns !== undefined && columns.fromSec <= sec && sec < endOfColumnsSec(columns);
}
