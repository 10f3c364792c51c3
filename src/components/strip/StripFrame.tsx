import { Fragment, useCallback, useMemo, type Dispatch, type RefObject } from 'react';
import { isMounted, type StripControl } from './hooks/useStripSetting';
import { type TrackLevels, type TrackPicture } from './hooks/useTrack';
import { type TrackSlip } from './hooks/useTrackSlip';
import { type Interaction, type InteractionEvent } from './model/interaction';
import { readingAt } from './model/reading';
import { cornerOn, type Track } from './model/track';
import { LoadingState } from './parts/LoadingState';
import { Readout } from './parts/Readout';
import { StripFoot } from './parts/StripFoot';
import { Toolbar } from './parts/Toolbar';
import { TrackPlot } from './parts/TrackPlot';
import { TrackReading } from './parts/TrackReading';
import { type StripProps } from './StripView';

/** One of the strips on the axis with everything that is shown of it. */
export interface MadeStrip extends TrackLevels, TrackPicture {
  track: Track;
  slip: TrackSlip;
}

interface StripFrameProps extends StripProps, StripControl {
  /** Its width is the strips'. */
  host: RefObject<HTMLDivElement | null>;
  interaction: Interaction;
  dispatch: Dispatch<InteractionEvent>;
  strips: MadeStrip[];
}

/** Order on a phone: strips under one another first, then their slips. On a desk a slip stands beside its strip. */
const PLOT_ORDER = ['order-1', 'order-2 desk:order-3'];
const SLIP_ORDER = ['order-3 desk:order-2', 'order-4'];

/** The strips with their shared toolbar, readout and legend, and a reading slip beside each. */
export function StripFrame(props: StripFrameProps) {
  const { setting, control, interaction, dispatch, strips } = props;
  const bands = strips[0]?.picture.pixels.bands;
  const clear = useCallback(() => dispatch({ type: 'select', selection: null }), [dispatch]);
  const readings = useMemo(
    () =>
      strips.map(({ track, levels, picture }) => {
        const step = { bySec: track.shiftSec, from: bands ?? [], to: picture.pixels.bands };
        const cursor = interaction.cursor && cornerOn(interaction.cursor, step);
        return { track, reading: cursor && readingAt(levels.layers, cursor, levels.weightsCentiDb) };
      }),
    [strips, bands, interaction.cursor],
  );
  return (
    // What the server has made answers to nothing yet.
    <div
      className="grid gap-x-6 gap-y-5 desk:grid-cols-[minmax(0,1fr)_18.25rem]"
      inert={!isMounted(setting.geometry)}
    >
      {strips.map((strip, at) => (
        <Fragment key={at}>
          <div ref={at === 0 ? props.host : undefined} className={`min-w-0 ${PLOT_ORDER[at]}`}>
            {at === 0 && (
              <>
                <Toolbar
                  control={control}
                  display={setting.display}
                  mayShowThirds={strips.every(({ track }) => track.station.bandFraction === 3)}
                  onDisplay={props.onDisplay}
                />
                <Readout
                  readings={readings}
                  weighting={setting.display.weighting}
                  zone={setting.zone}
                  isAnnounced={interaction.isByKeyboard}
                />
              </>
            )}
            <LoadingState columns={strip.columns} />
            <TrackPlot
              strip={strip}
              first={bands ?? []}
              isOneOfTwo={strips.length > 1}
              setting={setting}
              control={control}
              interaction={interaction}
              dispatch={dispatch}
            />
            {at === strips.length - 1 && (
              <StripFoot strips={strips} setting={setting} isMarked={interaction.selection !== null} />
            )}
          </div>
          <TrackReading
            strip={strip}
            other={strips.length > 1 ? (strips[1 - at] ?? null) : null}
            isFirst={at === 0}
            isMarked={interaction.selection !== null}
            setting={setting}
            may={props}
            className={SLIP_ORDER[at] ?? ''}
            onClear={clear}
          />
        </Fragment>
      ))}
    </div>
  );
}
