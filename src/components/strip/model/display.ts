import { type Band, type BandFraction } from '#lib/acoustics/bands';
import { weightOfBandDb, type Weighting } from '#lib/acoustics/weighting';
import { colourRange, traceRange, type LevelRange } from './levelAxis';
import { type StripLimit } from './limitLines';
import { octaveColumns } from './octaveColumns';
import { type StripColumns } from './stripColumns';

/** How levels are shown: weighted or not, in the station's bands or octaves. */
export interface Display {
  weighting: Weighting;
  fraction: BandFraction;
}

/** How levels are shown at first: unweighted, in thirds unless one of the stations has octaves only. */
export function firstDisplay(fractions: readonly BandFraction[]): Display {
  return { weighting: 'Z', fraction: fractions.includes(1) ? 1 : 3 };
}

const octavesOfColumns = new WeakMap<StripColumns, StripColumns>();

/** Layers in the bands of the display; the same object for the same layer. */
export function displayedLayers(
  layers: readonly StripColumns[],
  { fraction }: Display,
): readonly StripColumns[] {
  return fraction === 1 ? layers.map(inOctaves) : layers;
}

function inOctaves(columns: StripColumns): StripColumns {
  if (columns.bands[0]?.fraction === 1) return columns;
  const made = octavesOfColumns.get(columns) ?? octaveColumns(columns);
  octavesOfColumns.set(columns, made);
  return made;
}

/** Added to each band's unweighted level, hundredths of a dB. */
export function bandWeightsCentiDb(bands: readonly Band[], weighting: Weighting): number[] {
  return bands.map((band) => Math.round(weightOfBandDb(band.index, weighting) * 100));
}

/** The colour range of the first layer that holds anything: of a long view the first ones may lie before the station was there. */
export function firstColourRange(
  layers: readonly StripColumns[],
  weightsCentiDb: readonly number[],
): LevelRange | null {
  for (const { levelsCentiDb } of layers) {
    const range = colourRange(levelsCentiDb, weightsCentiDb);
    if (range) return range;
  }
  return null;
}

/** What the level trace has to span: all levels of the layers, and the limits. */
export function traceRangeOf(layers: readonly StripColumns[], limits: readonly StripLimit[]): LevelRange {
  return traceRange(
    layers.flatMap(({ laeqCentiDb, lafmaxCentiDb, percentiles }) => [
      laeqCentiDb,
      lafmaxCentiDb,
      ...(percentiles ? [percentiles.la90CentiDb] : []),
    ]),
    limits.map(({ thresholdDb }) => thresholdDb),
  );
}
