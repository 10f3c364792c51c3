import { type CSSProperties } from 'react';
import { NARROW_PX, stripGeometry } from '../draw/geometry';

const heightPx = (widthPx: number) => `${stripGeometry(widthPx).height}px`;

const HEIGHTS = { '--wide': heightPx(NARROW_PX), '--narrow': heightPx(NARROW_PX - 1) } as CSSProperties;

/** The strip's place until its scripts are there, in its size: what came early is drawn here (early/drawFirst.ts). */
export function FirstPicture() {
  return (
    <div className="@container" style={HEIGHTS}>
      <canvas
        data-first-picture
        aria-hidden="true"
        className="block h-(--wide) w-full @max-[560px]:h-(--narrow)"
      />
    </div>
  );
}
