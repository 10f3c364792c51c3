import { type Band } from '#lib/acoustics/bands';
import { type StripGeometry } from '../draw/geometry';
import { rowOfBand } from '../model/bandAxis';
import { selectedBands, type Selection } from '../model/selection';
import { pxAtSec, type TimeView } from '../model/timeView';

interface SelectionBoxProps {
  selection: Selection;
  view: TimeView;
  geometry: StripGeometry;
  bands: readonly Band[];
}

/** The selected time through all parts of the strip, and the selected bands within the spectrogram. */
export function SelectionBox({ selection, view, geometry, bands }: SelectionBoxProps) {
  const { spectrogram, lanes } = geometry;
  const from = Math.max(-2, pxAtSec(view, spectrogram.width, selection.fromSec));
  const to = Math.min(spectrogram.width + 2, pxAtSec(view, spectrogram.width, selection.toSec));
  if (to <= 0 || from >= spectrogram.width) return null;
  const across = { left: spectrogram.x + from, width: Math.max(2, to - from) };
  const rows = selection.bands && rowsOf(selection, bands, spectrogram.height);
  return (
    <>
      <div
        className="pointer-events-none absolute border border-dashed border-estuary bg-estuary/8"
        style={{ ...across, top: spectrogram.y, height: lanes.y + lanes.height - spectrogram.y }}
      />
      {rows && (
        <div
          className="pointer-events-none absolute border-2 border-estuary"
          style={{ ...across, top: spectrogram.y + rows.top, height: rows.height }}
        />
      )}
    </>
  );
}

function rowsOf(selection: Selection, bands: readonly Band[], heightPx: number) {
  const marked = selectedBands(selection, bands);
  const highest = marked.at(-1);
  if (!highest) return null;
  const rowPx = heightPx / bands.length;
  const top =
    rowOfBand(
      bands,
      bands.findIndex((band) => band.index === highest.index),
    ) * rowPx;
  return { top, height: marked.length * rowPx };
}
