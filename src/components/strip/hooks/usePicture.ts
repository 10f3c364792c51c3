import { useMemo, useState } from 'react';
import { type BandFraction } from '#lib/acoustics/bands';
import { type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { weightOfBandDb, type Weighting } from '#lib/acoustics/weighting';
import { levelRampRgb } from '#lib/format/levelRamp';
import { type StripPicture } from '../draw/drawStrip';
import { onDevice } from '../draw/surface';
import { type LimitLine } from '../draw/drawLimits';
import { type StripGeometry } from '../draw/geometry';
import { lanesOf, leftOutRuns } from '../model/lanes';
import { colourRange, traceRange, type LevelRange } from '../model/levelAxis';
import { timesOfValidity, type StripLimit } from '../model/limitLines';
import { octaveColumns } from '../model/octaveColumns';
import { pixelColumns } from '../model/pixelColumns';
import { type Run } from '../model/runs';
import { type StripColumns } from '../model/stripColumns';
import { type TimeView } from '../model/timeView';
import { useStable } from './useStable';
import { type Theme } from './useTheme';

/** How levels are shown: weighted or not, in the station's bands or octaves. */
export interface Display {
  weighting: Weighting;
  fraction: BandFraction;
}

interface PictureInput {
  layers: readonly StripColumns[];
  view: TimeView;
  geometry: StripGeometry;
  ratio: number;
  theme: Theme;
  display: Display;
  zone: string;
  scheme: PeriodScheme;
  limits: readonly StripLimit[];
  nowSec: number;
  gapWords: (gap: Run) => string;
}

export interface PictureMade {
  /** The layers in the bands of the display. */
  layers: readonly StripColumns[];
  /** Added to each band's level in the display, hundredths of a dB. */
  weightsCentiDb: readonly number[];
  picture: StripPicture;
}

/** What the canvas is to show, made anew only where what it is made of has changed. */
export function usePicture(input: PictureInput): PictureMade {
  const { view, geometry, ratio, theme, display, zone, limits, nowSec, gapWords } = input;
  const { fromSec, toSec } = view;
  const fetched = useStable(input.layers);
  const layers = useMemo(
    () => (display.fraction === 1 ? fetched.map(inOctaves) : fetched),
    [fetched, display.fraction],
  );
  const widthPx = onDevice(geometry.spectrogram, ratio).width;
  const pixels = useMemo(
    () => pixelColumns(layers, { fromSec, toSec }, widthPx),
    [layers, fromSec, toSec, widthPx],
  );
  const weightsCentiDb = useMemo(
    () => pixels.bands.map((band) => Math.round(weightOfBandDb(band.index, display.weighting) * 100)),
    [pixels.bands, display.weighting],
  );
  const range = useColourRange(layers, weightsCentiDb, display);
  const lines = useLimitLines(input);
  const levels = useMemo(
    () =>
      traceRange(
        layers.flatMap(({ laeqCentiDb, lafmaxCentiDb }) => [laeqCentiDb, lafmaxCentiDb]),
        limits.map(({ thresholdDb }) => thresholdDb),
      ),
    [layers, limits],
  );
  const picture = useMemo(
    (): StripPicture => ({
      geometry,
      view: { fromSec, toSec },
      zone,
      nowSec,
      pixels,
      colouring: range && { ramp: levelRampRgb(theme), range, weightsCentiDb },
      traceRange: levels,
      lanes: lanesOf(layers, { fromSec, toSec }, nowSec),
      leftOut: leftOutRuns(layers, { fromSec, toSec }),
      limits: lines,
      gapWords,
    }),
    [
      geometry,
      fromSec,
      toSec,
      zone,
      nowSec,
      pixels,
      range,
      theme,
      weightsCentiDb,
      levels,
      layers,
      lines,
      gapWords,
    ],
  );
  return { layers, weightsCentiDb, picture };
}

/** Times of validity are worked out for whole weeks about the view, so that moving it a little costs nothing. */
const WEEK_SEC = 7 * 86_400;

function useLimitLines({ limits, view, scheme, zone }: PictureInput): LimitLine[] {
  const fromSec = Math.floor(view.fromSec / WEEK_SEC) * WEEK_SEC;
  const toSec = Math.ceil(view.toSec / WEEK_SEC) * WEEK_SEC;
  return useMemo(
    () =>
      limits
        .map((limit) => ({ limit, runs: timesOfValidity(limit, { fromSec, toSec }, scheme, zone) }))
        .filter(({ runs }) => runs.length > 0),
    [limits, fromSec, toSec, scheme, zone],
  );
}

const octavesOfColumns = new WeakMap<StripColumns, StripColumns>();

function inOctaves(columns: StripColumns): StripColumns {
  if (columns.bands[0]?.fraction === 1) return columns;
  const made = octavesOfColumns.get(columns) ?? octaveColumns(columns);
  octavesOfColumns.set(columns, made);
  return made;
}

/** The range that colours span: taken once for each display, so that colours stay what they are while time moves. */
function useColourRange(
  layers: readonly StripColumns[],
  weightsCentiDb: readonly number[],
  { weighting, fraction }: Display,
): LevelRange | null {
  const [ranges, setRanges] = useState<Record<string, LevelRange>>({});
  const key = `${weighting}${fraction}`;
  const known = ranges[key];
  if (known) return known;
  const [first] = layers;
  const range = first ? colourRange(first.levelsCentiDb, weightsCentiDb) : null;
  if (range) setRanges({ ...ranges, [key]: range });
  return range;
}
