import { type Band } from '#lib/acoustics/bands';
import { type Rect, type StripGeometry } from '../draw/geometry';
import { selectionBoxes } from '../draw/selectionBoxes';
import { type Selection } from '../model/selection';
import { type TimeView } from '../model/timeView';

interface SelectionBoxProps {
  selection: Selection;
  view: TimeView;
  geometry: StripGeometry;
  bands: readonly Band[];
}

/** The selected time through all parts of the strip, and the selected bands within the spectrogram. */
export function SelectionBox({ selection, view, geometry, bands }: SelectionBoxProps) {
  const boxes = selectionBoxes(selection, view, geometry, bands);
  if (!boxes) return null;
  return (
    <>
      <div
        className="pointer-events-none absolute border border-dashed border-estuary bg-estuary/8"
        style={placeOf(boxes.time)}
      />
      {boxes.bands && (
        <div className="pointer-events-none absolute border-2 border-estuary" style={placeOf(boxes.bands)} />
      )}
    </>
  );
}

function placeOf({ x, y, width, height }: Rect) {
  return { left: x, top: y, width, height };
}
