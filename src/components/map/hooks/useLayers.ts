import { useState } from 'react';
import { keepInUrl } from '../model/keepInUrl';
import { MAP_LAYERS, type MapLayer } from '../model/layers';

/** Which layers are shown; the address carries them as `layers`. */
export function useLayers(initial: readonly MapLayer[]) {
  const [layers, setLayers] = useState<ReadonlySet<MapLayer>>(() => new Set(initial));
  const toggle = (layer: MapLayer) => {
    const shown = MAP_LAYERS.filter((one) => layers.has(one) !== (one === layer));
    setLayers(new Set(shown));
    keepInUrl('layers', shown.length === 0 ? null : shown.join(','));
  };
  return [layers, toggle] as const;
}
