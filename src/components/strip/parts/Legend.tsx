import { memo } from 'react';
import { levelRampRgb, type Theme } from '#lib/format/levelRamp';
import { type Weighting } from '#lib/acoustics/weighting';
import { type LevelRange } from '../model/levelAxis';
import { formatDuration } from '#lib/format/durations';

interface LegendProps {
  range: LevelRange | null;
  weighting: Weighting;
  theme: Theme;
  /** Length of the columns on the screen, s. */
  stepSec: number | null;
  /** Length of time that exceedance levels are of, s; null where there are none. */
  blockSec: number | null;
}

const STOPS = 24;

/** What the colours and the lines mean. */
export const Legend = memo(function Legend({ range, weighting, theme, stepSec, blockSec }: LegendProps) {
  return (
    <div className="mt-1 flex flex-wrap items-center gap-x-5 gap-y-1 text-small text-ink-soft">
      {range && (
        <span className="flex items-center gap-1.5 tabular-nums">
          {range.lowDb}
          <span
            aria-hidden="true"
            className="h-2.5 w-28 border border-line"
            style={{ background: gradient(theme) }}
          />
          {range.highDb} dB ({weighting}) a band
        </span>
      )}
      <span className="flex items-center gap-1.5">
        <span aria-hidden="true" className="h-0.5 w-4 bg-ink" />{' '}
        <span>
          L<sub>Aeq{stepSec !== null && `,${formatDuration(stepSec)}`}</sub>
        </span>
      </span>
      <span className="flex items-center gap-1.5">
        <span aria-hidden="true" className="h-2.5 w-4 bg-ink/25" />{' '}
        <span>
          up to L<sub>AFmax</sub>
        </span>
      </span>
      {blockSec !== null && (
        <span className="flex items-center gap-1.5">
          <span aria-hidden="true" className="flex h-2.5 w-4 items-center bg-reed/38">
            <span className="h-0.5 w-full bg-reed" />
          </span>
          <span>
            L<sub>A90,{formatDuration(blockSec)}</sub> to L<sub>A10</sub>, line L<sub>A50</sub>
          </span>
        </span>
      )}
      <span className="flex items-center gap-1.5">
        <span aria-hidden="true" className="w-4 border-t-2 border-dashed border-rust" /> limit
      </span>
      <span className="flex items-center gap-1.5">
        <span aria-hidden="true" className="h-2 w-4 bg-estuary" /> heard by residents
      </span>
    </div>
  );
});

function gradient(theme: Theme): string {
  const ramp = levelRampRgb(theme);
  const colours = Array.from({ length: STOPS }, (_, n) => {
    const at = Math.round((n * 255) / (STOPS - 1)) * 4;
    return `rgb(${ramp[at]} ${ramp[at + 1]} ${ramp[at + 2]})`;
  });
  return `linear-gradient(to right, ${colours.join(', ')})`;
}
