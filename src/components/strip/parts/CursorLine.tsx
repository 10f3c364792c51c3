import { type Band } from '#lib/acoustics/bands';
import { type StripGeometry } from '../draw/geometry';
import { rowOfBand } from '../model/bandAxis';
import { type Corner } from '../model/dragSelection';
import { pxAtSec, type TimeView } from '../model/timeView';

interface CursorLineProps {
  cursor: Corner;
  view: TimeView;
  geometry: StripGeometry;
  bands: readonly Band[];
}

/** A hairline at the cursor's time, and the outline of its band's row. */
export function CursorLine({ cursor, view, geometry, bands }: CursorLineProps) {
  const { spectrogram, lanes } = geometry;
  const px = pxAtSec(view, spectrogram.width, cursor.sec);
  if (px < 0 || px > spectrogram.width) return null;
  const rowPx = spectrogram.height / Math.max(1, bands.length);
  return (
    <>
      <div
        className="pointer-events-none absolute w-px bg-ink/70"
        style={{
          left: spectrogram.x + px,
          top: spectrogram.y,
          height: lanes.y + lanes.height - spectrogram.y,
        }}
      />
      {cursor.bandAt !== null && (
        <div
          className="pointer-events-none absolute border-y border-ink/40"
          style={{
            left: spectrogram.x,
            width: spectrogram.width,
            top: spectrogram.y + rowOfBand(bands, cursor.bandAt) * rowPx,
            height: rowPx,
          }}
        />
      )}
    </>
  );
}
