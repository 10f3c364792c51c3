import { useState } from 'react';
import Map, { NavigationControl, ScaleControl } from 'react-map-gl/maplibre';
import type { Station } from '#lib/contracts/stations';
import '../maplibre';
import { type MapPaneProps } from './MapPane';
import { ProjectedSlips } from './ProjectedSlips';

/** Name of the mark on the browser's timeline at which the map had drawn all that it had; later ones tell later rests. */
const MAP_IDLE_MARK = 'map-idle';

interface MapCanvasProps extends MapPaneProps {
  /** The browser turned out not to be able to draw it. */
  onImpossible: () => void;
}

/** The map with its slips. */
export default function MapCanvas({ styleUrls, onImpossible, ...slips }: MapCanvasProps) {
  const [hasBackground, setHasBackground] = useState(true);
  return (
    <>
      <Map
        initialViewState={viewOver(slips.stations)}
        mapStyle={styleUrls[slips.theme]}
        dragRotate={false}
        pitchWithRotate={false}
        touchPitch={false}
        maxZoom={17.5}
        fadeDuration={0}
        attributionControl={{ compact: true }}
        // There is no map to tell of what went wrong when it was made.
        onError={({ target }: { target: object | null }) =>
          target ? setHasBackground(false) : onImpossible()
        }
        onStyleData={() => setHasBackground(true)}
        onIdle={() => performance.mark(MAP_IDLE_MARK)}
        style={{ position: 'absolute', inset: 0 }}
      >
        <NavigationControl showCompass={false} />
        <ScaleControl />
        <ProjectedSlips {...slips} />
      </Map>
      {!hasBackground && (
        <p role="status" className="panel absolute bottom-2 left-2 px-3 py-1.5 text-small">
          The map’s background cannot be fetched at the moment. The stations lie where they should.
        </p>
      )}
    </>
  );
}

const MARGIN_PX = 90;

/** The view that holds every station; of a single one, its surroundings. */
function viewOver(stations: readonly Station[]) {
  const [first] = stations;
  if (!first) return { longitude: 0, latitude: 30, zoom: 1.5 };
  if (stations.length === 1) return { longitude: first.longitude, latitude: first.latitude, zoom: 14 };
  const longitudes = stations.map(({ longitude }) => longitude);
  const latitudes = stations.map(({ latitude }) => latitude);
  return {
    bounds: [
      Math.min(...longitudes),
      Math.min(...latitudes),
      Math.max(...longitudes),
      Math.max(...latitudes),
    ] as [number, number, number, number],
    fitBoundsOptions: { padding: MARGIN_PX, maxZoom: 15 },
  };
}
