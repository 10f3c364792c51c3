import { bandLabel, type Band } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { type Weighting } from '#lib/acoustics/weighting';
import { formatInstantUtc } from '#lib/contracts/instants';
import { csvText, type Cell } from '#lib/format/csvText';
import { reasonsOfMask } from './lanes';
import { type StripColumns } from './stripColumns';
import { type TimeView } from './timeView';
import { visibleParts } from './visibleParts';

/** What one strip shows, as numbers. */
export interface ShownLevels {
  stationCode: string;
  view: TimeView;
  layers: readonly StripColumns[];
  /** Added to each band's level, hundredths of a dB. */
  weightsCentiDb: readonly number[];
}

/**
 * The columns on the screen as a CSV file: a row a column of each strip, whole columns also at the edges; instants in UTC, levels
 * in dB, bands weighted as they are shown; LA10, LA50 and LA90 are of the block of UTC, `LAN_block_s` long, that a column begins in. A
 * column without data has its seconds and no levels.
 */
export function stripCsv(strips: readonly ShownLevels[], weighting: Weighting): string {
  const bands = bandsOfAll(strips);
  const head = [
    'station',
    'start_utc',
    'end_utc',
    'present_s',
    'valid_s',
    'LAeq_dB',
    'LAFmax_dB',
    'LAN_block_s',
    'LA10_dB',
    'LA50_dB',
    'LA90_dB',
    'left_out',
    ...bands.map((band) => `L${weighting}eq_${bandLabel(band)}_dB`.replaceAll(/\s/g, '')),
  ];
  return csvText([head, ...strips.flatMap((strip) => rowsOf(strip, bands))]);
}

function bandsOfAll(strips: readonly ShownLevels[]): Band[] {
  const bands = new Map(
    strips.flatMap(({ layers }) => (layers[0]?.bands ?? []).map((band) => [band.index, band])),
  );
  return [...bands.values()].sort((a, b) => a.index - b.index);
}

function rowsOf(strip: ShownLevels, bands: readonly Band[]): Cell[][] {
  return visibleParts(strip.layers, strip.view).flatMap(({ columns, within }) => {
    const first = Math.floor((within.fromSec - columns.fromSec) / columns.stepSec);
    const end = Math.ceil((within.toSec - columns.fromSec) / columns.stepSec);
    const places = bands.map((band) => columns.bands.findIndex(({ index }) => index === band.index));
    return Array.from({ length: end - first }, (_, n) => rowOf(strip, columns, first + n, places));
  });
}

function rowOf(strip: ShownLevels, columns: StripColumns, at: number, places: readonly number[]): Cell[] {
  const fromSec = columns.fromSec + at * columns.stepSec;
  return [
    strip.stationCode,
    formatInstantUtc(fromSec),
    formatInstantUtc(fromSec + columns.stepSec),
    columns.presentSec[at] ?? 0,
    columns.validSec[at] ?? 0,
    levelCell(columns.laeqCentiDb[at]),
    levelCell(columns.lafmaxCentiDb[at]),
    columns.percentiles?.blockSec ?? null,
    levelCell(columns.percentiles?.la10CentiDb[at]),
    levelCell(columns.percentiles?.la50CentiDb[at]),
    levelCell(columns.percentiles?.la90CentiDb[at]),
    reasonsOfMask(columns.reasonBits[at] ?? 0).join(' '),
    ...places.map((place) =>
      place < 0
        ? null
        : levelCell(columns.levelsCentiDb[at * columns.bands.length + place], strip.weightsCentiDb[place]),
    ),
  ];
}

function levelCell(centiDb: number | undefined, weightCentiDb = 0): Cell {
  return centiDb === undefined || centiDb === NO_LEVEL_CENTI_DB
    ? null
    : roundHalfUp((centiDb + weightCentiDb) / 100, 1);
}
