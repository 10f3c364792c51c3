import type { BandFraction } from '#lib/acoustics/bands';
import { levelRampRgb, type Theme } from '#lib/format/levelRamp';
import { stationUrlOf } from '../hooks/stationUrl';
import { type StripPicture } from '../draw/drawStrip';
import { stripGeometry } from '../draw/geometry';
import { onDevice } from '../draw/surface';
import { columnsUrl } from '../model/columnsRequest';
import { type StripComplaint } from '../model/complaintMarks';
import {
  bandWeightsCentiDb,
  displayedLayers,
  firstColourRange,
  firstDisplay,
  traceRangeOf,
} from '../model/display';
import { lanesOf, leftOutRuns } from '../model/lanes';
import { spanningRange } from '../model/levelAxis';
import { limitLinesOf, wholeWeeks, type ClockSetting, type StripLimit } from '../model/limitLines';
import { pixelColumns } from '../model/pixelColumns';
import { type StripColumns } from '../model/stripColumns';
import { tilesFor, tilesInView } from '../model/tiles';
import { clockStretchWords } from '../model/timeWords';
import { type TimeView } from '../model/timeView';
import { shifted } from '../model/track';

/** What the page says of its strips for the first picture: of each what is drawn, without the figures. */
export interface FirstStrips {
  slug: string;
  zone: string;
  period: TimeView;
  clocks: ClockSetting[];
  /** When the page was made. */
  madeSec: number;
  tracks: FirstTrack[];
}

export interface FirstTrack {
  station: { code: string; bandFraction: BandFraction; intervalSec: number };
  shiftSec: number;
  limits: StripLimit[];
  complaints: StripComplaint[];
}

/** Addresses of the columns that the strips show first, a list for each strip. */
export function firstColumnsUrls({ slug, period, madeSec, tracks }: FirstStrips): string[][] {
  return tracks.map(({ station, shiftSec }) => {
    const view = shifted(period, shiftSec);
    const tiles = tilesInView(tilesFor(view, station.intervalSec, madeSec), view);
    return tiles.map((tile) => columnsUrl(stationUrlOf(slug, station.code), tile));
  });
}

export interface Place {
  widthPx: number;
  /** Device pixels in a CSS pixel. */
  ratio: number;
  theme: Theme;
}

/**
 * The strips' first pictures, as the strip itself makes them; null where a strip has no levels, which it says itself.
 * `fetched`: each strip's columns.
 */
export function firstPictures(
  { zone, period, clocks, madeSec, tracks }: FirstStrips,
  fetched: readonly StripColumns[][],
  { widthPx, ratio, theme }: Place,
): (StripPicture | null)[] {
  const display = firstDisplay(tracks.map(({ station }) => station.bandFraction));
  const geometry = stripGeometry(widthPx);
  const pixelWidth = onDevice(geometry.spectrogram, ratio).width;
  const levels = tracks.map(({ limits }, at) => {
    const layers = displayedLayers(fetched[at] ?? [], display);
    const weightsCentiDb = bandWeightsCentiDb(layers[0]?.bands ?? [], display.weighting);
    return {
      layers,
      weightsCentiDb,
      colours: firstColourRange(layers, weightsCentiDb),
      trace: traceRangeOf(layers, limits),
    };
  });
  const colours = levels.map((one) => one.colours).reduce(spanningRange);
  const trace = levels.map((one) => one.trace).reduce((a, b) => spanningRange(a, b));
  return tracks.map(({ shiftSec, limits, complaints }, at): StripPicture | null => {
    const own = levels[at];
    if (!own || !colours) return null;
    const view = shifted(period, shiftSec);
    return {
      geometry,
      view,
      zone,
      nowSec: madeSec,
      pixels: pixelColumns(own.layers, view, pixelWidth),
      colouring: { ramp: levelRampRgb(theme), range: colours, weightsCentiDb: own.weightsCentiDb },
      traceRange: trace,
      lanes: lanesOf(own.layers, view, madeSec),
      leftOut: leftOutRuns(own.layers, view),
      limits: limitLinesOf(limits, wholeWeeks(view), clocks),
      complaints,
      gapWords: (gap) => `no data ${clockStretchWords(gap, zone)}`,
    };
  });
}
