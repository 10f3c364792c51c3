import { type ClockSetting } from './model/limitLines';
import { type TimeView } from './model/timeView';
import { type Track } from './model/track';
import { OneStrip } from './OneStrip';
import { TwoStrips } from './TwoStrips';

export interface StripProps {
  slug: string;
  /** The page's period: that of the axis. */
  period: TimeView;
  zone: string;
  /** The network's clock and periods of day, in order of their beginning. */
  clocks: ClockSetting[];
  /** The page's station, and what is shown under it, if anything. */
  tracks: [Track] | [Track, Track];
  /** When the page was made. */
  madeSec: number;
  mayExclude: boolean;
  mayLogComplaints: boolean;
}

/** One strip, or two under one another on one axis. */
export function StripView(props: StripProps) {
  const [first, second] = props.tracks;
  return second ? (
    <TwoStrips {...props} first={first} second={second} />
  ) : (
    <OneStrip {...props} only={first} />
  );
}
