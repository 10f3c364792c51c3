/** The stretch of time that the strip shows, epoch seconds, half-open; not necessarily whole. */
export interface TimeView {
  fromSec: number;
  toSec: number;
}

/** How far the strip zooms in and out, and how far to the right there is anything to see. */
export interface ViewBounds {
  shortestSec: number;
  longestSec: number;
  latestSec: number;
}

export function spanSec(view: TimeView): number {
  return view.toSec - view.fromSec;
}

/** Place of an instant on an axis `widthPx` long. */
export function pxAtSec(view: TimeView, widthPx: number, sec: number): number {
  return ((sec - view.fromSec) / spanSec(view)) * widthPx;
}

/** Instant at a place on the axis. */
export function secAtPx(view: TimeView, widthPx: number, px: number): number {
  return view.fromSec + (px / widthPx) * spanSec(view);
}

/** A view within bounds that keeps its length where it can; one that would begin after the latest instant moves back. */
function clampView(view: TimeView, bounds: ViewBounds): TimeView {
  const length = Math.min(bounds.longestSec, Math.max(bounds.shortestSec, spanSec(view)));
  const middle = (view.fromSec + view.toSec) / 2;
  const toSec = Math.min(bounds.latestSec, middle + length / 2);
  const fromSec = Math.max(0, toSec - length);
  return { fromSec, toSec: fromSec + length };
}

/** The view made `factor` times as long (below 1: zoomed in), the instant `aboutSec` staying where it is on the axis. */
export function zoomView(view: TimeView, factor: number, aboutSec: number, bounds: ViewBounds): TimeView {
  const length = Math.min(bounds.longestSec, Math.max(bounds.shortestSec, spanSec(view) * factor));
  const share = (aboutSec - view.fromSec) / spanSec(view);
  const fromSec = aboutSec - share * length;
  return clampView({ fromSec, toSec: fromSec + length }, bounds);
}

/** The view moved by some seconds, later when positive. */
export function panView(view: TimeView, bySec: number, bounds: ViewBounds): TimeView {
  return clampView({ fromSec: view.fromSec + bySec, toSec: view.toSec + bySec }, bounds);
}
