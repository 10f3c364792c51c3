import { useMemo } from 'react';
import { levelRampRgb, type Theme } from '#lib/format/levelRamp';
import { type StripPicture } from '../draw/drawStrip';
import { onDevice } from '../draw/surface';
import { type StripGeometry } from '../draw/geometry';
import { type StripComplaint } from '../model/complaintMarks';
import { lanesOf, leftOutRuns } from '../model/lanes';
import {
  limitLinesOf,
  wholeWeeks,
  type ClockSetting,
  type LimitLine,
  type StripLimit,
} from '../model/limitLines';
import { pixelColumns } from '../model/pixelColumns';
import { type Run } from '../model/runs';
import { type TimeView } from '../model/timeView';
import { type Levels } from './useLevels';

interface PictureInput {
  levels: Levels;
  view: TimeView;
  geometry: StripGeometry;
  ratio: number;
  theme: Theme;
  zone: string;
  clocks: readonly ClockSetting[];
  limits: readonly StripLimit[];
  complaints: readonly StripComplaint[];
  nowSec: number;
  gapWords: (gap: Run) => string;
}

/** What the canvas is to show, made anew only where what it is made of has changed. */
export function usePicture(input: PictureInput): StripPicture {
  const { geometry, ratio, theme, zone, nowSec, gapWords, complaints } = input;
  const { fromSec, toSec } = input.view;
  const { layers, weightsCentiDb } = input.levels;
  const { lowDb, highDb } = input.levels.colours ?? { lowDb: null, highDb: null };
  const { lowDb: traceLowDb, highDb: traceHighDb } = input.levels.trace;
  const widthPx = onDevice(geometry.spectrogram, ratio).width;
  const pixels = useMemo(
    () => pixelColumns(layers, { fromSec, toSec }, widthPx),
    [layers, fromSec, toSec, widthPx],
  );
  const lines = useLimitLines(input);
  const colouring = useMemo(
    () => (lowDb === null ? null : { ramp: levelRampRgb(theme), range: { lowDb, highDb }, weightsCentiDb }),
    [lowDb, highDb, theme, weightsCentiDb],
  );
  return useMemo(
    (): StripPicture => ({
      geometry,
      view: { fromSec, toSec },
      zone,
      nowSec,
      pixels,
      colouring,
      traceRange: { lowDb: traceLowDb, highDb: traceHighDb },
      lanes: lanesOf(layers, { fromSec, toSec }, nowSec),
      leftOut: leftOutRuns(layers, { fromSec, toSec }),
      limits: lines,
      complaints,
      gapWords,
    }),
    [
      geometry,
      fromSec,
      toSec,
      zone,
      nowSec,
      pixels,
      colouring,
      traceLowDb,
      traceHighDb,
      layers,
      lines,
      complaints,
      gapWords,
    ],
  );
}

function useLimitLines({ limits, view, clocks }: PictureInput): LimitLine[] {
  const { fromSec, toSec } = wholeWeeks(view);
  return useMemo(() => limitLinesOf(limits, { fromSec, toSec }, clocks), [limits, fromSec, toSec, clocks]);
}
