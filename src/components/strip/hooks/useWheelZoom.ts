import { useEffect, useEffectEvent, type RefObject } from 'react';
import { type StripGeometry } from '../draw/geometry';
import { secAtPx, type TimeView } from '../model/timeView';

/** Pixels of the wheel that double or halve the view. */
const DOUBLING_PX = 240;

/** Ctrl (or a pinch on a touchpad) with the wheel zooms about the pointer; a wheel to the side pans. */
export function useWheelZoom(
  element: RefObject<HTMLElement | null>,
  geometry: StripGeometry,
  view: TimeView,
  { zoom, pan }: { zoom: (factor: number, aboutSec: number) => void; pan: (bySec: number) => void },
): void {
  const onWheel = useEffectEvent((event: WheelEvent) => {
    const { x, width } = geometry.spectrogram;
    if (event.ctrlKey) {
      event.preventDefault();
      const left = element.current?.getBoundingClientRect().left ?? 0;
      zoom(2 ** (event.deltaY / DOUBLING_PX), secAtPx(view, width, event.clientX - left - x));
    } else if (Math.abs(event.deltaX) > Math.abs(event.deltaY)) {
      event.preventDefault();
      pan((event.deltaX / width) * (view.toSec - view.fromSec));
    }
  });

  useEffect(() => {
    const host = element.current;
    const listener = (event: WheelEvent) => onWheel(event);
    // The browser's own zoom is prevented, which a passive listener could not do.
    host?.addEventListener('wheel', listener, { passive: false });
    return () => host?.removeEventListener('wheel', listener);
  }, [element]);
}
