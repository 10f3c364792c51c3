import { useState, type RefObject } from 'react';
import { stripGeometry, type StripGeometry } from '../draw/geometry';
import { firstDisplay, type Display } from '../model/display';
import { type StripProps } from '../StripView';
import { useElementWidth } from './useElementWidth';
import { useLiveColumns } from './useLiveColumns';
import { useNow } from './useNow';
import { useTheme } from './useTheme';
import { useTimeView, type TimeViewControl } from './useTimeView';
import { type StripSetting } from './useTrack';

const NOW_EVERY_SEC = 15;

export interface StripControl {
  setting: StripSetting;
  control: TimeViewControl;
  onDisplay: (display: Display) => void;
}

/** What the strips on one axis share: their view, their size, the clock, and how levels are shown. */
export function useStripSetting(
  { slug, zone, clocks, period, tracks, madeSec }: StripProps,
  host: RefObject<HTMLElement | null>,
): StripControl {
  const geometry = useGeometry(useElementWidth(host));
  const theme = useTheme();
  const nowSec = useNow(NOW_EVERY_SEC, madeSec);
  const intervalSec = Math.min(...tracks.map(({ station }) => station.intervalSec));
  const control = useTimeView(period, intervalSec, nowSec);
  const [display, onDisplay] = useState(() =>
    firstDisplay(tracks.map(({ station }) => station.bandFraction)),
  );
  const isTold = useLiveColumns(
    slug,
    tracks.map(({ station }) => station.code),
  );
  const setting: StripSetting = {
    slug,
    zone,
    clocks,
    geometry,
    ratio: isMounted(geometry) ? window.devicePixelRatio : 1,
    theme,
    nowSec,
    view: control.view,
    display,
    isTold,
  };
  return { setting, control, onDisplay };
}

/** Whether the strip's place is known: not before it stands in a page. What it shows until then is what the server has made of it. */
export function isMounted({ width }: StripGeometry): boolean {
  return width > 0;
}

function useGeometry(width: number) {
  const [geometry, setGeometry] = useState(() => stripGeometry(width));
  if (geometry.width === width) return geometry;
  const next = stripGeometry(width);
  setGeometry(next);
  return next;
}
