import { type StripSetting } from '../hooks/useTrack';
import { stationWords } from '../model/trackWords';
import { type MadeStrip } from '../StripFrame';
import { Legend } from './Legend';
import { SavePicture } from './SavePicture';

interface StripFootProps {
  strips: readonly MadeStrip[];
  setting: StripSetting;
  isMarked: boolean;
}

/** The legend, and the ways to take away what is shown. */
export function StripFoot({ strips, setting, isMarked }: StripFootProps) {
  const { weighting } = setting.display;
  const columns = strips[0]?.levels.layers[0];
  const stepSec = columns?.stepSec ?? null;
  const blockSec = columns?.percentiles?.blockSec ?? null;
  return (
    <div className="flex flex-wrap items-center justify-between gap-x-5 gap-y-2">
      <Legend
        range={strips[0]?.picture.colouring?.range ?? null}
        weighting={weighting}
        theme={setting.theme}
        stepSec={stepSec}
        blockSec={blockSec}
      />
      <SavePicture
        sheet={{
          parts: strips.map(({ track, picture, slip }) => ({
            picture,
            title: stationWords(track),
            exceedances: track.exceedances,
            selection: isMarked ? slip.selection : null,
          })),
          weighting,
          stepSec,
          blockSec,
        }}
        levels={strips.map(({ track, view, levels }) => ({
          stationCode: track.station.code,
          view,
          layers: levels.layers,
          weightsCentiDb: levels.weightsCentiDb,
        }))}
        ratio={setting.ratio}
        summary={strips.map(({ summary }) => summary).join(' ')}
      />
    </div>
  );
}
