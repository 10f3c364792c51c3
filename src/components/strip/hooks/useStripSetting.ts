import { useState, type RefObject } from 'react';
import { stripGeometry } from '../draw/geometry';
import { type StripProps } from '../StripView';
import { useElementWidth } from './useElementWidth';
import { type Display } from './useLevels';
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
  { slug, zone, clocks, period, tracks }: StripProps,
  host: RefObject<HTMLElement | null>,
): StripControl {
  const geometry = useGeometry(useElementWidth(host));
  const theme = useTheme();
  const nowSec = useNow(NOW_EVERY_SEC);
  const intervalSec = Math.min(...tracks.map(({ station }) => station.intervalSec));
  const control = useTimeView(period, intervalSec, nowSec);
  const fraction = tracks.some(({ station }) => station.bandFraction === 1) ? 1 : 3;
  const [display, onDisplay] = useState<Display>({ weighting: 'Z', fraction });
  const isTold = useLiveColumns(
    slug,
    tracks.map(({ station }) => station.code),
  );
  const setting: StripSetting = {
    slug,
    zone,
    clocks,
    geometry,
    ratio: window.devicePixelRatio,
    theme,
    nowSec,
    view: control.view,
    display,
    isTold,
  };
  return { setting, control, onDisplay };
}

function useGeometry(width: number) {
  const [geometry, setGeometry] = useState(() => stripGeometry(width));
  if (geometry.width === width) return geometry;
  const next = stripGeometry(width);
  setGeometry(next);
  return next;
}
