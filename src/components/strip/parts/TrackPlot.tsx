import { useCallback, useMemo, type Dispatch } from 'react';
import { type Band } from '#lib/acoustics/bands';
import { type TimeViewControl } from '../hooks/useTimeView';
import { isMounted } from '../hooks/useStripSetting';
import { type StripSetting } from '../hooks/useTrack';
import { type Interaction, type InteractionEvent } from '../model/interaction';
import { cornerOn, interactionOn } from '../model/track';
import { stripTitle } from '../model/trackWords';
import { type MadeStrip } from '../StripFrame';
import { FirstPicture } from './FirstPicture';
import { StripPlot } from './StripPlot';

interface TrackPlotProps {
  strip: MadeStrip;
  /** Bands of the first strip: the shared marks name them by their places. */
  first: readonly Band[];
  isOneOfTwo: boolean;
  setting: StripSetting;
  control: TimeViewControl;
  interaction: Interaction;
  dispatch: Dispatch<InteractionEvent>;
}

/** One strip's plot: the shared view, cursor and selection turned into its own time and bands, and back. */
export function TrackPlot(props: TrackPlotProps) {
  const { strip, first, setting, control, dispatch } = props;
  const { track, view, picture } = strip;
  const { bands } = picture.pixels;
  const bySec = track.shiftSec;
  const interaction = useMemo(
    () => interactionOn(props.interaction, { bySec, from: first, to: bands }),
    [props.interaction, bySec, first, bands],
  );
  const send = useCallback(
    (event: InteractionEvent) =>
      dispatch(
        'corner' in event
          ? { ...event, corner: cornerOn(event.corner, { bySec: -bySec, from: bands, to: first }) }
          : event,
      ),
    [dispatch, bySec, bands, first],
  );
  const own: TimeViewControl = {
    ...control,
    view,
    zoom: (factor, aboutSec) => control.zoom(factor, aboutSec === undefined ? undefined : aboutSec - bySec),
  };
  return (
    <>
      {props.isOneOfTwo && <h2 className="mb-1 text-body">{stripTitle(track, view, setting.zone)}</h2>}
      {isMounted(setting.geometry) ? (
        <StripPlot
          picture={picture}
          ratio={setting.ratio}
          theme={setting.theme}
          control={own}
          interaction={interaction}
          dispatch={send}
          stepSec={strip.levels.layers[0]?.stepSec ?? track.station.intervalSec}
          exceedances={track.exceedances}
          exceedancesUrl={`/n/${setting.slug}/exceedances`}
          complaintsUrl={`/n/${setting.slug}/complaints`}
          summary={strip.summary}
        />
      ) : (
        <FirstPicture />
      )}
    </>
  );
}
