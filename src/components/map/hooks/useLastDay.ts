import { keepPreviousData, useQuery } from '@tanstack/react-query';
import type { Statistics } from '#lib/contracts/levels';
import { fetchColumns } from '../../strip/hooks/fetchColumns';
import { fetchJson } from '../../strip/hooks/fetchJson';
import { periodQuery } from '../../strip/hooks/useStatistics';
import { type StripColumns } from '../../strip/model/stripColumns';

const DAY_SEC = 86_400;
const STEP_SEC = 900;
const EVERY_MS = 60_000;

export interface LastDay {
  fromSec: number;
  toSec: number;
  /** LAeq of quarter-hours. */
  columns: StripColumns;
  statistics: Statistics;
}

/** A station's 24 hours up to an instant (epoch seconds), or up to now, in quarter-hours with their figures. */
export function useLastDay(slug: string, code: string, untilSec: number | null) {
  const url = `/api/v1/networks/${slug}/stations/${encodeURIComponent(code)}`;
  return useQuery({
    queryKey: ['last-day', url, untilSec],
    queryFn: ({ signal }) => fetchLastDay(url, untilSec ?? Math.floor(Date.now() / 60_000) * 60, signal),
    placeholderData: keepPreviousData,
    refetchInterval: untilSec === null ? EVERY_MS : false,
  });
}

async function fetchLastDay(url: string, toSec: number, signal: AbortSignal): Promise<LastDay> {
  const period = { fromSec: toSec - DAY_SEC, toSec };
  const gridFromSec = Math.floor(period.fromSec / STEP_SEC) * STEP_SEC;
  const tile = { fromSec: gridFromSec, toSec: gridFromSec + DAY_SEC + STEP_SEC, stepSec: STEP_SEC };
  const [columns, statistics] = await Promise.all([
    fetchColumns(url, tile, signal, (tile.toSec - tile.fromSec) / STEP_SEC),
    fetchJson<Statistics>(`${url}/statistics?${periodQuery(period)}`, signal),
  ]);
  return { ...period, columns, statistics };
}
