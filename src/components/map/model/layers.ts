/** What may lie over the stations, in the order in which it is offered. */
export const MAP_LAYERS = ['exceedances', 'complaints', 'wind'] as const;
export type MapLayer = (typeof MAP_LAYERS)[number];

export const LAYER_LABELS: Record<MapLayer, string> = {
  exceedances: 'Exceedances',
  complaints: 'Complaints',
  wind: 'Wind',
};

/** Reads `layers=exceedances,wind` of an address; what it does not know is left out. */
export function readLayers(text: string | null): MapLayer[] {
  const named = new Set(text?.split(',') ?? []);
  return MAP_LAYERS.filter((layer) => named.has(layer));
}
