import { useState } from 'react';
import { panView, spanSec, zoomView, type TimeView, type ViewBounds } from '../model/timeView';

/** A period that ends this close to now is followed. */
const FOLLOWED_WITHIN_SEC = 600;
/** A leap year. */
const LONGEST_SEC = 366 * 86_400;
/** Intervals that the closest view shows. */
const FEWEST_INTERVALS = 10;

export interface TimeViewControl {
  view: TimeView;
  /** Whether the view moves along with the clock. */
  isFollowing: boolean;
  canFollow: boolean;
  isWholePeriod: boolean;
  /** `factor` below 1 zooms in; about the middle where no instant is given. */
  zoom: (factor: number, aboutSec?: number) => void;
  pan: (bySec: number) => void;
  reset: () => void;
  setFollowing: (isFollowing: boolean) => void;
}

interface State {
  chosen: TimeView;
  isFollowing: boolean;
}

/** What stretch of time the strip shows: the page's period, zoomed and panned, or moving along with the clock. */
export function useTimeView(period: TimeView, intervalSec: number, nowSec: number): TimeViewControl {
  const canFollow = Math.abs(period.toSec - nowSec) < FOLLOWED_WITHIN_SEC;
  const [state, setState] = useState<State>({ chosen: period, isFollowing: canFollow });
  const edgeSec = Math.ceil(nowSec / intervalSec) * intervalSec;
  const viewOf = ({ chosen, isFollowing }: State): TimeView =>
    isFollowing ? { fromSec: edgeSec - spanSec(chosen), toSec: edgeSec } : chosen;
  const bounds: ViewBounds = {
    shortestSec: intervalSec * FEWEST_INTERVALS,
    longestSec: Math.max(LONGEST_SEC, spanSec(period)),
    latestSec: Math.max(period.toSec, edgeSec),
  };
  // Moves build on the state, not on what is on the screen: several may come before the next picture.
  const move = (moved: (view: TimeView) => TimeView) =>
    setState((before) => ({ chosen: moved(viewOf(before)), isFollowing: false }));
  const { chosen } = state;
  return {
    view: viewOf(state),
    isFollowing: state.isFollowing,
    canFollow,
    isWholePeriod: state.isFollowing
      ? spanSec(chosen) === spanSec(period)
      : chosen.fromSec === period.fromSec && chosen.toSec === period.toSec,
    zoom: (factor, aboutSec) =>
      move((view) => zoomView(view, factor, aboutSec ?? (view.fromSec + view.toSec) / 2, bounds)),
    pan: (bySec) => move((view) => panView(view, bySec, bounds)),
    reset: () => setState({ chosen: period, isFollowing: canFollow }),
    setFollowing: (isFollowing) => setState((before) => ({ chosen: viewOf(before), isFollowing })),
  };
}
