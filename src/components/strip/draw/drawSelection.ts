import { type Selection } from '../model/selection';
import { type StripPicture } from './drawStrip';
import { selectionBoxes } from './selectionBoxes';
import { type Surface } from './surface';

/** The selection as the page shows it: its time dashed through all parts, its bands outlined in the spectrogram. */
export function drawSelection(
  { context, palette, ratio }: Surface,
  { view, geometry, pixels }: StripPicture,
  selection: Selection,
): void {
  const boxes = selectionBoxes(selection, view, geometry, pixels.bands);
  if (!boxes) return;
  context.setTransform(ratio, 0, 0, ratio, 0, 0);
  context.save();
  context.strokeStyle = palette.estuary;
  context.lineWidth = 1;
  context.setLineDash([4, 3]);
  const { time, bands } = boxes;
  context.strokeRect(time.x + 0.5, time.y + 0.5, time.width - 1, time.height - 1);
  if (bands) {
    context.setLineDash([]);
    context.lineWidth = 2;
    context.strokeRect(bands.x + 1, bands.y + 1, Math.max(1, bands.width - 2), bands.height - 2);
  }
  context.restore();
}
