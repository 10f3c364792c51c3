import { useCallback, useMemo } from 'react';
import { type StripPicture } from '../draw/drawStrip';
import { type StripGeometry } from '../draw/geometry';
import { type ClockSetting } from '../model/limitLines';
import { type Display } from '../model/display';
import { type Run } from '../model/runs';
import { stripSummary } from '../model/summary';
import { clockStretchWords } from '../model/timeWords';
import { type TimeView } from '../model/timeView';
import { shifted, type Track } from '../model/track';
import { stationUrlOf } from './stationUrl';
import { useColumns, type Columns } from './useColumns';
import { useDebounced } from './useDebounced';
import { useLevels, type Levels } from './useLevels';
import { usePicture } from './usePicture';
import { isMounted } from './useStripSetting';
import { type Theme } from '#lib/format/levelRamp';

/** What all strips on one axis have in common. */
export interface StripSetting {
  slug: string;
  zone: string;
  clocks: readonly ClockSetting[];
  geometry: StripGeometry;
  ratio: number;
  theme: Theme;
  nowSec: number;
  /** The axis's own time; a strip's is shifted from it. */
  view: TimeView;
  display: Display;
  isTold: boolean;
}

/** What was fetched for a strip. */
export interface TrackLevels {
  view: TimeView;
  columns: Columns;
  levels: Levels;
}

/** Fetches what a strip shows of its time. */
export function useTrackLevels({ station, shiftSec, limits }: Track, setting: StripSetting): TrackLevels {
  const { slug, nowSec, geometry, isTold, display } = setting;
  const view = shifted(setting.view, shiftSec);
  const stationUrl = stationUrlOf(slug, station.code);
  const columns = useColumns({
    stationUrl,
    view,
    intervalSec: station.intervalSec,
    nowSec,
    isMounted: isMounted(geometry),
    isTold,
  });
  return { view, columns, levels: useLevels(columns.layers, display, limits) };
}

/** Time that a picture must stand still before it is put into words. */
const SUMMARY_MS = 200;

/** A strip's picture, and what it shows in a sentence. */
export interface TrackPicture {
  picture: StripPicture;
  summary: string;
}

/** Makes a strip's picture of its levels; `levels` says which ranges its colours and its trace span. */
export function useTrackPicture(
  { station, limits, complaints }: Track,
  { view, levels }: Pick<TrackLevels, 'view' | 'levels'>,
  { geometry, ratio, theme, zone, clocks, nowSec }: StripSetting,
): TrackPicture {
  const gapWords = useCallback((gap: Run) => `no data ${clockStretchWords(gap, zone)}`, [zone]);
  const picture = usePicture({
    levels,
    view,
    geometry,
    ratio,
    theme,
    zone,
    clocks,
    limits,
    complaints,
    nowSec,
    gapWords,
  });
  // Nobody is told of what passes by in a gesture.
  const settled = useDebounced(picture, SUMMARY_MS);
  const summary = useMemo(() => stripSummary(station.name, settled), [station.name, settled]);
  return { picture, summary };
}
