import { useQueries, useQueryClient, type UseQueryOptions } from '@tanstack/react-query';
import { takeColumnsThere } from '../early/earlyColumns';
import { columnsUrl } from '../model/columnsRequest';
import { endOfColumnsSec, type StripColumns } from '../model/stripColumns';
import { tilesFor, tilesInView, type Tile } from '../model/tiles';
import { spanSec, type TimeView } from '../model/timeView';
import { fetchColumns } from './fetchColumns';

/** How often what is still being measured is asked for again, where nothing tells that there is more. */
export const LIVE_EVERY_MS = 15_000;
/** How often where something does: what came late shows by this. */
const TOLD_EVERY_MS = 60_000;
const KEEP_MS = 10 * 60_000;
const MOST_LAYERS = 12;

export interface Columns {
  /** What there is to draw, in order of preference: the wanted tiles, then what earlier views left. */
  layers: StripColumns[];
  isLoading: boolean;
  error: Error | null;
  retry: () => void;
}

export interface ColumnsWanted {
  stationUrl: string;
  view: TimeView;
  intervalSec: number;
  nowSec: number;
  /** Whether the strip stands in a page: before that nothing is fetched. */
  isMounted: boolean;
  /** Whether new columns are told of as they arrive. */
  isTold: boolean;
}

/** A station's columns for a view. While finer or farther tiles are on their way, the layers that were there remain. */
export function useColumns({
  stationUrl,
  view,
  intervalSec,
  nowSec,
  isMounted,
  isTold,
}: ColumnsWanted): Columns {
  const client = useQueryClient();
  const everyMs = isTold ? TOLD_EVERY_MS : LIVE_EVERY_MS;
  const tiles = isMounted ? tilesFor(view, intervalSec, nowSec) : [];
  const inView = tilesInView(tiles, view);
  const queryOf = (tile: Tile) => tileQuery(stationUrl, tile, nowSec, everyMs);
  const wanted = useQueries({ queries: inView.map(queryOf) });
  const isLoading = wanted.some((query) => query.isLoading);
  // What a pan would show waits until what is looked at is there.
  const margins = useQueries({
    queries: tiles
      .filter((tile) => !inView.includes(tile))
      .map((tile) => ({ ...queryOf(tile), enabled: !isLoading })),
  });
  const stepSec = tiles[0]?.stepSec;
  const fresh = [...wanted, ...margins].flatMap(({ data }) => data ?? []);
  const older = client
    .getQueriesData<StripColumns>({ queryKey: ['columns', stationUrl] })
    .flatMap(([, columns]) => columns ?? [])
    .filter((columns) => columns.stepSec !== stepSec && isNear(columns, view))
    .sort((a, b) => a.stepSec - b.stepSec);
  return {
    layers: [...fresh, ...older].slice(0, MOST_LAYERS),
    isLoading,
    error: wanted.find((query) => query.error)?.error ?? null,
    retry: () => wanted.filter((query) => query.error).forEach((query) => void query.refetch()),
  };
}

function tileQuery(
  stationUrl: string,
  tile: Tile,
  nowSec: number,
  everyMs: number,
): UseQueryOptions<StripColumns> {
  // A tile goes on changing while its end lies ahead, and for a while when data come late.
  const isLive = tile.toSec > nowSec - 3600;
  return {
    queryKey: ['columns', stationUrl, tile.stepSec, tile.fromSec],
    queryFn: ({ signal }) => fetchColumns(stationUrl, tile, signal),
    initialData: () => takeColumnsThere(columnsUrl(stationUrl, tile)),
    staleTime: isLive ? LIVE_EVERY_MS : KEEP_MS,
    gcTime: KEEP_MS,
    refetchInterval: isLive ? everyMs : false,
  };
}

function isNear(columns: StripColumns, view: TimeView): boolean {
  const marginSec = spanSec(view) * 0.2;
  return columns.fromSec < view.toSec + marginSec && endOfColumnsSec(columns) > view.fromSec - marginSec;
}
