import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { formatInstantUtc } from '#lib/contracts/instants';
import type { MapLayers, NetworkWind } from '#lib/contracts/networkMap';
import { fetchJson } from '../../strip/hooks/fetchJson';
import { type MapLayer } from '../model/layers';

const EVERY_MS = 60_000;
const DAY_SEC = 86_400;

/** The period of the page; where the address names none, the 24 hours up to now. */
export interface MapPeriod {
  fromSec: number;
  toSec: number;
  isDefault: boolean;
}

export interface LayerQuery {
  slug: string;
  layers: ReadonlySet<MapLayer>;
  period: MapPeriod;
  /** The instant that the wind is told of, epoch seconds; null: now. */
  windAtSec: number | null;
}

/** What the layers that are switched on show. */
export function useLayerData({ slug, layers, period, windAtSec }: LayerQuery) {
  const base = `/api/v1/networks/${slug}`;
  const events = useQuery({
    queryKey: ['map-layers', slug, period],
    enabled: layers.has('exceedances') || layers.has('complaints'),
    queryFn: ({ signal }) => fetchJson<MapLayers>(`${base}/map-layers?${periodQuery(period)}`, signal),
    refetchInterval: EVERY_MS,
  });
  const wind = useQuery({
    queryKey: ['wind', slug, windAtSec],
    enabled: layers.has('wind'),
    queryFn: ({ signal }) => {
      const at = formatInstantUtc(windAtSec ?? Math.floor(Date.now() / 1000));
      return fetchJson<NetworkWind>(`${base}/wind?at=${at}`, signal);
    },
    placeholderData: keepPreviousData,
    refetchInterval: windAtSec === null ? EVERY_MS : false,
  });
  return {
    exceedances: layers.has('exceedances') ? events.data?.exceedances : undefined,
    complaints: layers.has('complaints') ? events.data?.complaints : undefined,
    winds: layers.has('wind') ? wind.data?.items : undefined,
    error: events.error ?? wind.error,
  };
}

export type LayerData = ReturnType<typeof useLayerData>;

function periodQuery({ fromSec, toSec, isDefault }: MapPeriod): string {
  const nowSec = Math.floor(Date.now() / 1000);
  const [from, to] = isDefault ? [nowSec - DAY_SEC, nowSec] : [fromSec, toSec];
  return new URLSearchParams({ from: formatInstantUtc(from), to: formatInstantUtc(to) }).toString();
}
