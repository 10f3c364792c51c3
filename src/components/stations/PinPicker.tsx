import { lazy, Suspense, useState } from 'react';
import { hasWebGl } from '../map/webgl';
import { useTypedPlace } from './useTypedPlace';

export interface PinPickerProps {
  /** Ids of the form's fields that hold the coordinates; the pin and they follow each other. */
  latitudeId: string;
  longitudeId: string;
  styleUrls: { light: string; dark: string };
  others: readonly { code: string; latitude: number; longitude: number }[];
  /** Whose place the pin is. */
  meaning?: string;
}

const PinMap = lazy(() => import('./PinMap'));

/** A pin on a small map beside the coordinate fields, which work without it. */
export function PinPicker({
  latitudeId,
  longitudeId,
  styleUrls,
  others,
  meaning = 'Place of the station',
}: PinPickerProps) {
  const [place, setPlace] = useTypedPlace(latitudeId, longitudeId);
  const [canDraw] = useState(hasWebGl);
  if (!canDraw) {
    return (
      <p className="bg-sunk p-4 text-ink-soft">
        This browser cannot draw the map. Type the coordinates instead.
      </p>
    );
  }
  return (
    <div>
      <div className="map-pane relative h-72 bg-sunk">
        <Suspense
          fallback={<p className="grid h-full place-items-center text-ink-soft">Fetching the map …</p>}
        >
          <PinMap {...{ place, styleUrls, others, meaning }} onPlace={setPlace} />
        </Suspense>
      </div>
      <p className="field-hint">
        {place
          ? 'Drag the pin, or tap another place.'
          : 'Tap the map to set the pin, or type the coordinates.'}
      </p>
    </div>
  );
}
