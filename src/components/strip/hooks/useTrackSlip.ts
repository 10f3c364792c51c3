import { useMemo } from 'react';
import { type Interaction } from '../model/interaction';
import { type Selection } from '../model/selection';
import { shifted, type Track } from '../model/track';
import { stationUrlOf } from './stationUrl';
import { useDebounced } from './useDebounced';
import { useSlipFigures, type SlipState } from './useSlipFigures';
import { type StripSetting, type TrackLevels } from './useTrack';

/** Time that a view must stand still before the slip is of it. */
const FOLLOW_MS = 100;

/** What a strip's reading slip is of, and its figures. */
export interface TrackSlip {
  /** In the strip's own time: what is marked, else all that is shown. */
  selection: Selection;
  state: SlipState;
}

/** The figures of what is marked on the axis, or of all that it shows, for one strip. */
export function useTrackSlip(
  { station, shiftSec, statistics }: Track,
  { levels }: TrackLevels,
  { selection: marked, anchor }: Interaction,
  { slug, view, display, nowSec }: StripSetting,
): TrackSlip {
  // Figures of all that is shown follow once it stands still: in a gesture they would take the time of the picture.
  const { fromSec, toSec } = useDebounced(view, FOLLOW_MS);
  const selection = useMemo((): Selection => {
    const whole = { fromSec: Math.floor(fromSec), toSec: Math.ceil(toSec), bands: null };
    return shifted(marked ?? whole, shiftSec);
  }, [fromSec, toSec, marked, shiftSec]);
  const state = useSlipFigures({
    stationUrl: stationUrlOf(slug, station.code),
    selection,
    isMarked: marked !== null,
    isSettled: anchor === null,
    layers: levels.layers,
    fraction: display.fraction,
    intervalSec: station.intervalSec,
    nowSec,
    known: statistics,
  });
  return { selection, state };
}
