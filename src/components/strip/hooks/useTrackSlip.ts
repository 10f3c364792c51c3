import { useMemo } from 'react';
import { type Interaction } from '../model/interaction';
import { type Selection } from '../model/selection';
import { shifted, type Track } from '../model/track';
import { stationUrlOf } from './stationUrl';
import { useSlipFigures, type SlipState } from './useSlipFigures';
import { type StripSetting, type TrackLevels } from './useTrack';

/** What a strip's reading slip is of, and its figures. */
export interface TrackSlip {
  /** In the strip's own time: what is marked, else all that is shown. */
  selection: Selection;
  state: SlipState;
}

/** The figures of what is marked on the axis, or of all that it shows, for one strip. */
export function useTrackSlip(
  { station, shiftSec }: Track,
  { levels }: TrackLevels,
  { selection: marked, anchor }: Interaction,
  { slug, view, display, nowSec }: StripSetting,
): TrackSlip {
  const { fromSec, toSec } = view;
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
  });
  return { selection, state };
}
