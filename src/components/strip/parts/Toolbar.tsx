import { type ReactNode } from 'react';
import { type Display } from '../model/display';
import { type TimeViewControl } from '../hooks/useTimeView';
import { spanSec } from '../model/timeView';

interface ToolbarProps {
  control: TimeViewControl;
  display: Display;
  /** Whether every strip has thirds: else only octaves can be compared. */
  mayShowThirds: boolean;
  onDisplay: (display: Display) => void;
}

/** Zoom, pan, and how levels are shown. */
export function Toolbar({ control, display, mayShowThirds, onDisplay }: ToolbarProps) {
  const { view, zoom, pan } = control;
  const { weighting, fraction } = display;
  return (
    <div
      className="mb-2 flex flex-wrap items-center gap-x-4 gap-y-2 text-small"
      role="toolbar"
      aria-label="Strip"
    >
      <div className="flex items-center">
        <IconButton label="Earlier" onPress={() => pan(-spanSec(view) / 2)}>
          <path d="M10 3 5 8l5 5" />
        </IconButton>
        <IconButton label="Zoom out" onPress={() => zoom(2)}>
          <path d="M3 8h10" />
        </IconButton>
        <IconButton label="Zoom in" onPress={() => zoom(0.5)}>
          <path d="M3 8h10M8 3v10" />
        </IconButton>
        <IconButton label="Later" onPress={() => pan(spanSec(view) / 2)}>
          <path d="m6 3 5 5-5 5" />
        </IconButton>
        {!control.isWholePeriod && (
          <button type="button" className="button button-plain button-small ml-1" onClick={control.reset}>
            Whole period
          </button>
        )}
      </div>
      <Choice
        label="Bands"
        chosen={String(fraction)}
        options={
          mayShowThirds
            ? [
                ['3', 'thirds'],
                ['1', 'octaves'],
              ]
            : []
        }
        onChoose={(value) => onDisplay({ ...display, fraction: value === '3' ? 3 : 1 })}
      />
      <Choice
        label="Colours"
        chosen={weighting}
        options={[
          ['Z', 'unweighted (Z)'],
          ['A', 'A-weighted'],
        ]}
        onChoose={(value) => onDisplay({ ...display, weighting: value === 'A' ? 'A' : 'Z' })}
      />
      {control.canFollow && (
        <label className="flex items-center gap-1.5">
          <input
            type="checkbox"
            className="accent-reed"
            checked={control.isFollowing}
            onChange={(event) => control.setFollowing(event.target.checked)}
          />
          follow now
        </label>
      )}
    </div>
  );
}

function IconButton({
  label,
  onPress,
  children,
}: {
  label: string;
  onPress: () => void;
  children: ReactNode;
}) {
  return (
    <button
      type="button"
      aria-label={label}
      title={label}
      onClick={onPress}
      className="-ml-px grid size-8 place-items-center border border-edge text-ink first:rounded-l-slight last-of-type:rounded-r-slight hover:bg-ink/5"
    >
      <svg
        viewBox="0 0 16 16"
        width="14"
        height="14"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.6"
        aria-hidden="true"
      >
        {children}
      </svg>
    </button>
  );
}

interface ChoiceProps {
  label: string;
  chosen: string;
  options: readonly (readonly [value: string, text: string])[];
  onChoose: (value: string) => void;
}

/** A few alternatives side by side. */
function Choice({ label, chosen, options, onChoose }: ChoiceProps) {
  if (options.length === 0) return null;
  return (
    <div role="group" aria-label={label} className="flex">
      {options.map(([value, text]) => (
        <button
          key={value}
          type="button"
          aria-pressed={value === chosen}
          onClick={() => onChoose(value)}
          className="-ml-px border border-edge px-2.5 py-1 text-ink-soft first:rounded-l-slight last:rounded-r-slight hover:bg-ink/5 aria-pressed:bg-ink/8 aria-pressed:font-medium aria-pressed:text-ink"
        >
          {text}
        </button>
      ))}
    </div>
  );
}
