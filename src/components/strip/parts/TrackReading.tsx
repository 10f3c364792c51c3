import { useMemo } from 'react';
import { type StripSetting } from '../hooks/useTrack';
import { stationWords } from '../model/trackWords';
import { type MadeStrip } from '../StripFrame';
import { type StripProps } from '../StripView';
import { ReadingSlip } from './ReadingSlip';
import { type SlipContext } from './SlipActions';

interface TrackReadingProps {
  strip: MadeStrip;
  /** The strip that it stands beside, if any. */
  other: MadeStrip | null;
  isFirst: boolean;
  isMarked: boolean;
  setting: StripSetting;
  may: Pick<StripProps, 'mayExclude' | 'mayLogComplaints'>;
  className: string;
  onClear: () => void;
}

/** A strip's reading slip; beside another one it names its station, and the second says how far it differs from the first. */
export function TrackReading({ strip, other, isFirst, setting, may, ...props }: TrackReadingProps) {
  const { track, slip } = strip;
  const { slug, zone } = setting;
  const { code } = track.station;
  const { mayExclude, mayLogComplaints } = may;
  const otherCode = other?.track.station.code ?? null;
  const shiftSec = (other?.track.shiftSec ?? 0) - track.shiftSec;
  const context = useMemo(
    (): SlipContext => ({
      slug,
      stationCode: code,
      zone,
      mayExclude,
      mayLogComplaints,
      beside: isFirst && otherCode !== null ? { stationCode: otherCode, shiftSec } : null,
    }),
    [slug, code, zone, mayExclude, mayLogComplaints, isFirst, otherCode, shiftSec],
  );
  return (
    <ReadingSlip
      {...props}
      selection={slip.selection}
      state={slip.state}
      fraction={setting.display.fraction}
      context={context}
      title={other && stationWords(track)}
      reference={isFirst ? null : (other?.slip.state.figures ?? null)}
    />
  );
}
