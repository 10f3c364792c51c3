import { useMemo, useState } from 'react';
import {
  bandWeightsCentiDb,
  displayedLayers,
  firstColourRange,
  traceRangeOf,
  type Display,
} from '../model/display';
import { type LevelRange } from '../model/levelAxis';
import { type StripLimit } from '../model/limitLines';
import { type StripColumns } from '../model/stripColumns';
import { useStable } from './useStable';

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
  const layers = useMemo(() => displayedLayers(kept, display), [kept, display]);
  const bands = layers[0]?.bands;
  const weightsCentiDb = useMemo(
    () => bandWeightsCentiDb(bands ?? [], display.weighting),
    [bands, display.weighting],
  );
  const colours = useColourRange(layers, weightsCentiDb, display);
  const trace = useMemo(() => traceRangeOf(layers, limits), [layers, limits]);
  return { layers, weightsCentiDb, colours, trace };
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
  const range = firstColourRange(layers, weightsCentiDb);
  if (range) setRanges({ ...ranges, [key]: range });
  return range;
}
