import { useMemo, useRef } from 'react';
import { useInteraction } from './hooks/useInteraction';
import { useStripSetting } from './hooks/useStripSetting';
import { useTrackLevels, useTrackPicture } from './hooks/useTrack';
import { useTrackSlip } from './hooks/useTrackSlip';
import { gridOf } from './model/interaction';
import { spanningRange } from './model/levelAxis';
import { type Track } from './model/track';
import { StripFrame } from './StripFrame';
import { type StripProps } from './StripView';

/** Two stations or two periods under one another: one axis, one cursor, one selection, and the same colours for the same levels. */
export function TwoStrips({ first, second, ...props }: StripProps & { first: Track; second: Track }) {
  const host = useRef<HTMLDivElement>(null);
  const strip = useStripSetting(props, host);
  const { setting } = strip;
  const [a, b] = [useTrackLevels(first, setting), useTrackLevels(second, setting)];
  const ranges = useMemo(
    () => ({
      colours: spanningRange(a.levels.colours, b.levels.colours),
      trace: spanningRange(a.levels.trace, b.levels.trace),
    }),
    [a.levels.colours, b.levels.colours, a.levels.trace, b.levels.trace],
  );
  const madeA = useTrackPicture(first, { ...a, levels: { ...a.levels, ...ranges } }, setting);
  const madeB = useTrackPicture(second, { ...b, levels: { ...b.levels, ...ranges } }, setting);
  const grid = gridOf(
    [first.station.intervalSec, second.station.intervalSec],
    [a.levels.layers, b.levels.layers],
  );
  const [interaction, dispatch] = useInteraction(grid);
  const slipA = useTrackSlip(first, a, interaction, setting);
  const slipB = useTrackSlip(second, b, interaction, setting);
  return (
    <StripFrame
      {...props}
      {...strip}
      host={host}
      interaction={interaction}
      dispatch={dispatch}
      strips={[
        { track: first, ...a, ...madeA, slip: slipA },
        { track: second, ...b, ...madeB, slip: slipB },
      ]}
    />
  );
}
