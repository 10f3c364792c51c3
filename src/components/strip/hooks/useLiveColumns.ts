import { useQueryClient } from '@tanstack/react-query';
import { useRef } from 'react';
import { endOfColumnsSec, type StripColumns } from '../model/stripColumns';
import { stationUrlOf } from './stationUrl';
import { useLive } from './useLive';

/** A station that measures every second has its newest columns fetched no more often than this. */
const LEAST_BETWEEN_MS = 4000;

/** Has the columns that are still being measured fetched as soon as their station has measured more; answers whether that works. */
export function useLiveColumns(slug: string, stationCodes: readonly string[]): boolean {
  const client = useQueryClient();
  const lastMs = useRef(new Map<string, number>());
  const lastStart = useRef(new Map<string, string>());
  return useLive(slug, ({ code, start }) => {
    const before = lastStart.current.get(code);
    if (!stationCodes.includes(code) || (before !== undefined && start <= before)) return;
    lastStart.current.set(code, start);
    const nowMs = Date.now();
    // The first event only tells where the station stands: that has just been fetched.
    if (before === undefined || nowMs - (lastMs.current.get(code) ?? 0) < LEAST_BETWEEN_MS) return;
    lastMs.current.set(code, nowMs);
    const startSec = Date.parse(start) / 1000;
    void client.invalidateQueries({
      queryKey: ['columns', stationUrlOf(slug, code)],
      predicate: ({ state }) => holds(state.data as StripColumns | undefined, startSec),
    });
  });
}

function holds(columns: StripColumns | undefined, sec: number): boolean {
  return columns !== undefined && columns.fromSec <= sec && sec < endOfColumnsSec(columns);
}
