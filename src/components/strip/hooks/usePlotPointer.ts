import { useRef, type Dispatch, type PointerEvent } from 'react';
import { type Band } from '#lib/acoustics/bands';
import { type StripGeometry } from '../draw/geometry';
import { bandAtPx } from '../model/bandAxis';
import { type Corner } from '../model/dragSelection';
import { type InteractionEvent } from '../model/interaction';
import { secAtPx, type TimeView } from '../model/timeView';

/** A press that moves less than this is no drag. */
const DRAG_FROM_PX = 4;

interface PlotPointer {
  onPointerDown: (event: PointerEvent<HTMLElement>) => void;
  onPointerMove: (event: PointerEvent<HTMLElement>) => void;
  onPointerUp: () => void;
  onPointerCancel: () => void;
  onPointerLeave: () => void;
}

/** Hovering and dragging over the plot, whose top left is that of the spectrogram. */
export function usePlotPointer(
  geometry: StripGeometry,
  view: TimeView,
  bands: readonly Band[],
  dispatch: Dispatch<InteractionEvent>,
): PlotPointer {
  const pressed = useRef<{ x: number; y: number; corner: Corner; isDrag: boolean } | null>(null);

  const cornerOf = (event: PointerEvent<HTMLElement>): Corner => {
    const box = event.currentTarget.getBoundingClientRect();
    const x = Math.min(geometry.spectrogram.width - 0.01, Math.max(0, event.clientX - box.left));
    const y = event.clientY - box.top;
    const { height } = geometry.spectrogram;
    const isOnBands = y < height && bands.length > 0;
    return {
      sec: secAtPx(view, geometry.spectrogram.width, x),
      bandAt: isOnBands ? bandAtPx(bands, height, y) : null,
    };
  };

  const onPointerMove = (event: PointerEvent<HTMLElement>) => {
    const press = pressed.current;
    const corner = cornerOf(event);
    if (!press) return dispatch({ type: 'hover', corner });
    if (!press.isDrag) {
      if (Math.hypot(event.clientX - press.x, event.clientY - press.y) < DRAG_FROM_PX) return;
      press.isDrag = true;
      dispatch({ type: 'drag-start', corner: press.corner });
    }
    // A rectangle that began on the bands stays on them; a stretch of time that began below takes no bands.
    const bandAt = press.corner.bandAt === null ? null : (corner.bandAt ?? 0);
    dispatch({ type: 'drag', corner: { sec: corner.sec, bandAt } });
  };

  const end = () => {
    if (pressed.current?.isDrag) dispatch({ type: 'drag-end' });
    pressed.current = null;
  };

  return {
    onPointerDown: (event) => {
      if (event.button !== 0) return;
      event.currentTarget.setPointerCapture(event.pointerId);
      pressed.current = { x: event.clientX, y: event.clientY, corner: cornerOf(event), isDrag: false };
    },
    onPointerMove,
    onPointerUp: end,
    onPointerCancel: end,
    onPointerLeave: () => dispatch({ type: 'leave' }),
  };
}
