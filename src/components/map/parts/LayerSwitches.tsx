import { LAYER_LABELS, MAP_LAYERS, type MapLayer } from '../model/layers';

interface LayerSwitchesProps {
  layers: ReadonlySet<MapLayer>;
  onToggle: (layer: MapLayer) => void;
}

/** Which layers lie over the map. */
export function LayerSwitches({ layers, onToggle }: LayerSwitchesProps) {
  return (
    <fieldset className="flex flex-wrap gap-x-4 gap-y-1 text-table" data-screen-only>
      <legend className="sr-only">Also shown</legend>
      {MAP_LAYERS.map((layer) => (
        <label key={layer} className="flex min-h-8 items-center gap-1.5">
          <input
            type="checkbox"
            className="size-4 accent-reed"
            checked={layers.has(layer)}
            onChange={() => onToggle(layer)}
          />
          {LAYER_LABELS[layer]}
        </label>
      ))}
    </fieldset>
  );
}
