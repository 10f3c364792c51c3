import { useRef, type PointerEvent } from 'react';
import { spanSec, type TimeView } from '../model/timeView';

/** Dragging the time axis moves the view along with the pointer. */
export function useAxisDrag(view: TimeView, widthPx: number, pan: (bySec: number) => void) {
  const lastX = useRef<number | null>(null);
  const end = () => {
    lastX.current = null;
  };
  return {
    onPointerDown: (event: PointerEvent<HTMLElement>) => {
      event.currentTarget.setPointerCapture(event.pointerId);
      lastX.current = event.clientX;
    },
    onPointerMove: (event: PointerEvent<HTMLElement>) => {
      if (lastX.current === null || event.clientX === lastX.current) return;
      pan(((lastX.current - event.clientX) / widthPx) * spanSec(view));
      lastX.current = event.clientX;
    },
    onPointerUp: end,
    onPointerCancel: end,
  };
}
