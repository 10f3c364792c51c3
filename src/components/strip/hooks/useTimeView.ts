import { useState } from 'react';
import { panView, spanSec, zoomView, type TimeView, type ViewBounds } from '../model/timeView';

/** A period that ends this close to now is followed. */
const FOLLOWED_WITHIN_SEC = 600;
const LONGEST_SEC = 100 * 86_400;
/** Intervals that the closest view shows. */
const FEWEST_INTERVALS = 10;

export interface TimeViewControl {
  view: TimeView;
  isFollowing: boolean;
  canFollow: boolean;
  isWholePeriod: boolean;
  zoom: (factor: number, aboutSec?: number) => void;
  pan: (bySec: number) => void;
  reset: () => void;
  setFollowing: (isFollowing: boolean) => void;
}

/** What stretch of time the strip shows: the page's period, zoomed and panned, or moving along with the clock. */
export function useTimeView(period: TimeView, intervalSec: number, nowSec: number): TimeViewControl {
  const canFollow = Math.abs(period.toSec - nowSec) < FOLLOWED_WITHIN_SEC;
  const [chosen, setChosen] = useState(period);
  const [isFollowing, setFollowing] = useState(canFollow);
  const edgeSec = Math.ceil(nowSec / intervalSec) * intervalSec;
  const view = isFollowing ? { fromSec: edgeSec - spanSec(chosen), toSec: edgeSec } : chosen;
  const bounds: ViewBounds = {
    shortestSec: intervalSec * FEWEST_INTERVALS,
    longestSec: Math.max(LONGEST_SEC, spanSec(period)),
    latestSec: Math.max(period.toSec, edgeSec),
  };
  const choose = (next: TimeView) => {
    setFollowing(false);
    setChosen(next);
  };
  return {
    view,
    isFollowing,
    canFollow,
    isWholePeriod: chosen.fromSec === period.fromSec && chosen.toSec === period.toSec,
    zoom: (factor, aboutSec = (view.fromSec + view.toSec) / 2) =>
      choose(zoomView(view, factor, aboutSec, bounds)),
    pan: (bySec) => choose(panView(view, bySec, bounds)),
    reset: () => {
      setChosen(period);
      setFollowing(canFollow);
    },
    setFollowing: (next) => {
      if (!next) setChosen(view);
      setFollowing(next);
    },
  };
}
