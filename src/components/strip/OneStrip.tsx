import { useRef } from 'react';
import { useInteraction } from './hooks/useInteraction';
import { useStripSetting } from './hooks/useStripSetting';
import { useTrackLevels, useTrackPicture } from './hooks/useTrack';
import { useTrackSlip } from './hooks/useTrackSlip';
import { gridOf } from './model/interaction';
import { type Track } from './model/track';
import { StripFrame } from './StripFrame';
import { type StripProps } from './StripView';

/** A station's strip by itself. */
export function OneStrip({ only, ...props }: StripProps & { only: Track }) {
  const host = useRef<HTMLDivElement>(null);
  const strip = useStripSetting(props, host);
  const { setting } = strip;
  const held = useTrackLevels(only, setting);
  const made = useTrackPicture(only, held, setting);
  const [interaction, dispatch] = useInteraction(gridOf([only.station.intervalSec], [held.levels.layers]));
  const slip = useTrackSlip(only, held, interaction, setting);
  return (
    <StripFrame
      {...props}
      {...strip}
      host={host}
      interaction={interaction}
      dispatch={dispatch}
      strips={[{ track: only, ...held, ...made, slip }]}
    />
  );
}
