import { useMemo, useState } from 'react';
import { type BandFraction } from '#lib/acoustics/bands';
import { weightOfBandDb, type Weighting } from '#lib/acoustics/weighting';
import { colourRange, traceRange, type LevelRange } from '../model/levelAxis';
import { type StripLimit } from '../model/limitLines';
import { octaveColumns } from '../model/octaveColumns';
import { type StripColumns } from '../model/stripColumns';
import { useStable } from './useStable';

/** How levels are shown: weighted or not, in the station's bands or octaves. */
export interface Display {
  weighting: Weighting;
  fraction: BandFraction;
}

/** The levels that a strip shows, and the ranges that they span by themselves. */
export interface Levels {
  /** The layers in the bands of the display. */
  layers: readonly StripColumns[];
  /** Added to each band's level in the display, hundredths of a dB. */
  weightsCentiDb: readonly number[];
  /** Null while nothing is there. */
  colours: LevelRange | null;
  trace: LevelRange;
}

/** Fetched layers as they are to be shown, made anew only where what they are made of has changed. */
export function useLevels(
  fetched: readonly StripColumns[],
  display: Display,
  limits: readonly StripLimit[],
): Levels {
  const kept = useStable(fetched);
  const layers = useMemo(
    () => (display.fraction === 1 ? kept.map(inOctaves) : kept),
    [kept, display.fraction],
  );
  const bands = layers[0]?.bands;
  const weightsCentiDb = useMemo(
    () => (bands ?? []).map((band) => Math.round(weightOfBandDb(band.index, display.weighting) * 100)),
    [bands, display.weighting],
  );
  const colours = useColourRange(layers, weightsCentiDb, display);
  const trace = useMemo(
    () =>
      traceRange(
        layers.flatMap(({ laeqCentiDb, lafmaxCentiDb, percentiles }) => [
          laeqCentiDb,
          lafmaxCentiDb,
          ...(percentiles ? [percentiles.la90CentiDb] : []),
        ]),
        limits.map(({ thresholdDb }) => thresholdDb),
      ),
    [layers, limits],
  );
  return { layers, weightsCentiDb, colours, trace };
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
  const range = firstRange(layers, weightsCentiDb);
  if (range) setRanges({ ...ranges, [key]: range });
  return range;
}

/** The range of the first layer that holds anything: of a long view the first ones may lie before the station was there. */
function firstRange(layers: readonly StripColumns[], weightsCentiDb: readonly number[]): LevelRange | null {
  for (const { levelsCentiDb } of layers) {
    const range = colourRange(levelsCentiDb, weightsCentiDb);
    if (range) return range;
  }
  return null;
}
