import { useId, useRef, type Dispatch, type KeyboardEvent } from 'react';
import { useAxisDrag } from '../hooks/useAxisDrag';
import { usePlotPointer } from '../hooks/usePlotPointer';
import { type TimeViewControl } from '../hooks/useTimeView';
import { useWheelZoom } from '../hooks/useWheelZoom';
import { type Theme } from '#lib/format/levelRamp';
import { type StripPicture } from '../draw/drawStrip';
import { type StripExceedance } from '../model/exceedanceMarks';
import { type Interaction, type InteractionEvent } from '../model/interaction';
import { movedCursor } from '../model/keyboard';
import { ComplaintMarks } from './ComplaintMarks';
import { CursorLine } from './CursorLine';
import { ExceedanceMarks } from './ExceedanceMarks';
import { SelectionBox } from './SelectionBox';
import { StripCanvas } from './StripCanvas';

interface StripPlotProps {
  picture: StripPicture;
  ratio: number;
  theme: Theme;
  control: TimeViewControl;
  interaction: Interaction;
  dispatch: Dispatch<InteractionEvent>;
  /** Length of the columns on the screen. */
  stepSec: number;
  exceedances: readonly StripExceedance[];
  exceedancesUrl: string;
  complaintsUrl: string;
  summary: string;
}

const KEYS_HELP =
  'Arrow keys move the cursor through time and bands, with shift in bigger steps; Enter starts and ends a selection, ' +
  'Escape clears it; plus and minus zoom; page up and page down pan.';

/** The picture with what lies over it and what can be done on it by pointer and keyboard. */
export function StripPlot(props: StripPlotProps) {
  const { picture, ratio, theme, control, interaction, dispatch, exceedances, exceedancesUrl } = props;
  const { geometry, view } = picture;
  const { bands } = picture.pixels;
  const plot = useRef<HTMLDivElement>(null);
  const helpId = useId();
  const pointer = usePlotPointer(geometry, view, bands, dispatch);
  const axis = useAxisDrag(view, geometry.axis.width, control.pan);
  useWheelZoom(plot, geometry, view, control);
  const { spectrogram, trace, lanes } = geometry;

  return (
    // The cursor's keys belong to the strip while it has the focus, as an application's do.
    // eslint-disable-next-line jsx-a11y/no-noninteractive-element-interactions
    <div
      ref={plot}
      role="application"
      // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex
      tabIndex={0}
      aria-label={props.summary}
      aria-roledescription="strip"
      aria-describedby={helpId}
      className="relative select-none"
      style={{ height: geometry.height }}
      onKeyDown={(event) => onKey(event, props)}
    >
      <p id={helpId} className="sr-only">
        {KEYS_HELP}
      </p>
      <StripCanvas picture={picture} ratio={ratio} theme={theme} />
      {interaction.selection && (
        <SelectionBox selection={interaction.selection} view={view} geometry={geometry} bands={bands} />
      )}
      {interaction.cursor && (
        <CursorLine cursor={interaction.cursor} view={view} geometry={geometry} bands={bands} />
      )}
      <div
        {...pointer}
        className="absolute cursor-crosshair touch-pan-y"
        style={{
          left: spectrogram.x,
          top: spectrogram.y,
          width: spectrogram.width,
          height: lanes.y + lanes.height - spectrogram.y,
        }}
      />
      <ExceedanceMarks
        exceedances={exceedances}
        view={view}
        geometry={geometry}
        zone={picture.zone}
        listUrl={exceedancesUrl}
      />
      <ComplaintMarks
        complaints={picture.complaints}
        view={view}
        geometry={geometry}
        zone={picture.zone}
        listUrl={props.complaintsUrl}
      />
      <div
        {...axis}
        title="Drag to move through time"
        className="absolute cursor-grab touch-pan-y active:cursor-grabbing"
        style={{ left: trace.x, top: geometry.axis.y, width: trace.width, height: geometry.axis.height }}
      />
    </div>
  );
}

function onKey(event: KeyboardEvent<HTMLDivElement>, props: StripPlotProps): void {
  // Keys on a mark's link are the link's.
  if (event.target !== event.currentTarget || event.ctrlKey || event.metaKey || event.altKey) return;
  const { control, interaction, dispatch, picture } = props;
  const spanSec = control.view.toSec - control.view.fromSec;
  const about = interaction.cursor?.sec;
  const acts: Record<string, () => void> = {
    Enter: () => dispatch({ type: 'enter' }),
    Escape: () => dispatch({ type: 'escape' }),
    '+': () => control.zoom(0.5, about),
    '-': () => control.zoom(2, about),
    PageUp: () => control.pan(-spanSec / 2),
    PageDown: () => control.pan(spanSec / 2),
  };
  const act = acts[event.key];
  const corner = movedCursor(interaction.cursor, event.key, {
    view: control.view,
    stepSec: props.stepSec,
    bandCount: picture.pixels.bands.length,
    isShift: event.shiftKey,
  });
  if (!act && !corner) return;
  event.preventDefault();
  if (act) act();
  if (corner) dispatch({ type: 'cursor', corner });
}
