import { type Band } from '#lib/acoustics/bands';
import { rowOfBand } from '../model/bandAxis';
import { selectedBands, type Selection } from '../model/selection';
import { pxAtSec, type TimeView } from '../model/timeView';
import { type Rect, type StripGeometry } from './geometry';

/** A selection's time through all parts of the strip, and its bands within the spectrogram where it names some. */
export interface SelectionBoxes {
  time: Rect;
  bands: Rect | null;
}

/** Where a selection lies on the strip; null where none of it is in sight. */
export function selectionBoxes(
  selection: Selection,
  view: TimeView,
  { spectrogram, lanes }: StripGeometry,
  bands: readonly Band[],
): SelectionBoxes | null {
  const from = Math.max(-2, pxAtSec(view, spectrogram.width, selection.fromSec));
  const to = Math.min(spectrogram.width + 2, pxAtSec(view, spectrogram.width, selection.toSec));
  if (to <= 0 || from >= spectrogram.width) return null;
  const across = { x: spectrogram.x + from, width: Math.max(2, to - from) };
  const rows = selection.bands && rowsOf(selection, bands, spectrogram.height);
  return {
    time: { ...across, y: spectrogram.y, height: lanes.y + lanes.height - spectrogram.y },
    bands: rows && { ...across, y: spectrogram.y + rows.top, height: rows.height },
  };
}

function rowsOf(selection: Selection, bands: readonly Band[], heightPx: number) {
  const marked = selectedBands(selection, bands);
  const highest = marked.at(-1);
  if (!highest) return null;
  const rowPx = heightPx / bands.length;
  const at = bands.findIndex((band) => band.index === highest.index);
  return { top: rowOfBand(bands, at) * rowPx, height: marked.length * rowPx };
}
