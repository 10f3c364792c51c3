import { useEffect, useRef, useState } from 'react';
import MapGl, { Marker, NavigationControl, type MapRef } from 'react-map-gl/maplibre';
import '../map/maplibre';
import { useTheme } from '../strip/hooks/useTheme';
import { type PinPickerProps } from './PinPicker';
import { type Place } from './useTypedPlace';

interface Props extends Pick<PinPickerProps, 'styleUrls' | 'others'> {
  meaning: string;
  place: Place | null;
  onPlace: (place: Place) => void;
}

const NEAR_ZOOM = 14;

/** The map with the pin and the stations that are there already. Loaded only where it can be drawn. */
export default function PinMap({ place, onPlace, styleUrls, others, meaning }: Props) {
  const theme = useTheme();
  const map = useRef<MapRef>(null);
  const [hasBackground, setHasBackground] = useState(true);
  const { latitude, longitude } = place ?? {};

  // Coordinates that are typed may lie outside the view.
  useEffect(() => {
    if (latitude === undefined || longitude === undefined) return;
    const bounds = map.current?.getBounds();
    if (bounds && !bounds.contains([longitude, latitude]))
      map.current?.jumpTo({ center: [longitude, latitude] });
  }, [latitude, longitude]);

  return (
    <>
      <MapGl
        ref={map}
        initialViewState={firstView(place, others)}
        mapStyle={styleUrls[theme]}
        dragRotate={false}
        touchPitch={false}
        cursor="crosshair"
        attributionControl={{ compact: true }}
        onClick={({ lngLat }) => onPlace({ latitude: lngLat.lat, longitude: lngLat.lng })}
        onError={() => setHasBackground(false)}
        onStyleData={() => setHasBackground(true)}
        style={{ position: 'absolute', inset: 0 }}
      >
        <NavigationControl showCompass={false} />
        {others.map((other) => (
          <Marker
            key={other.code}
            latitude={other.latitude}
            longitude={other.longitude}
            style={{ pointerEvents: 'none' }}
          >
            <span className="flex items-center gap-1 text-small text-ink-soft">
              <span className="size-2 border border-ink-soft bg-paper" />
              {other.code}
            </span>
          </Marker>
        ))}
        {place && (
          <Marker
            {...place}
            anchor="bottom"
            draggable
            onDragEnd={({ lngLat }) => onPlace({ latitude: lngLat.lat, longitude: lngLat.lng })}
          >
            <Pin meaning={meaning} />
          </Marker>
        )}
      </MapGl>
      {!hasBackground && (
        <p role="status" className="panel absolute bottom-2 left-2 px-3 py-1.5 text-small">
          The map’s background cannot be fetched at the moment. Type the coordinates.
        </p>
      )}
    </>
  );
}

function Pin({ meaning }: { meaning: string }) {
  return (
    <svg width="26" height="36" viewBox="0 0 26 36" className="text-reed" role="img" aria-label={meaning}>
      <path
        d="M13 35 3.6 19.4A11 11 0 1 1 22.4 19.4z"
        fill="currentColor"
        stroke="var(--color-paper)"
        strokeWidth="1.5"
      />
      <circle cx="13" cy="12.5" r="4" fill="var(--color-paper)" />
    </svg>
  );
}

/** Near the place that is given; else over the stations that are there; else the whole earth. */
function firstView(place: Place | null, others: Props['others']) {
  const near = place ?? others[0];
  if (!near) return { longitude: 0, latitude: 30, zoom: 1 };
  if (place || others.length === 1)
    return { longitude: near.longitude, latitude: near.latitude, zoom: NEAR_ZOOM };
  const longitudes = others.map(({ longitude }) => longitude);
  const latitudes = others.map(({ latitude }) => latitude);
  return {
    bounds: [
      Math.min(...longitudes),
      Math.min(...latitudes),
      Math.max(...longitudes),
      Math.max(...latitudes),
    ] as [number, number, number, number],
    fitBoundsOptions: { padding: 50, maxZoom: NEAR_ZOOM },
  };
}
