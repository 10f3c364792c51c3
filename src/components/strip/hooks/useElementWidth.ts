import { useLayoutEffect, useState, type RefObject } from 'react';

/** Width of an element in CSS pixels, followed; known before the first picture, so that nothing jumps. 0 before that. */
export function useElementWidth(element: RefObject<HTMLElement | null>): number {
  const [width, setWidth] = useState(0);
  useLayoutEffect(() => {
    if (!element.current) return undefined;
    setWidth(Math.floor(element.current.getBoundingClientRect().width));
    const observer = new ResizeObserver(([entry]) => setWidth(Math.floor(entry?.contentRect.width ?? 0)));
    observer.observe(element.current);
    return () => observer.disconnect();
  }, [element]);
  return width;
}
