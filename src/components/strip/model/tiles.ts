import { spanSec, type TimeView } from './timeView';

/** A stretch of columns that is fetched and kept as one. Tiles of one step lie on one grid, so that panning reuses them. */
export interface Tile {
  fromSec: number;
  toSec: number;
  stepSec: number;
}

/** Lengths of a column that divide an hour or a day evenly. */
const STEPS_SEC = [1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600, 7200, 10800, 21600, 43200, 86400];

/** Columns of a tile. */
export const TILE_COLUMNS = 1920;

/** Beyond this the server answers from quarter-hours, so that a column is whole quarter-hours. */
export const LONG_PERIOD_SEC = 14 * 86_400;
const QUARTER_SEC = 900;

/** Share of the view that is fetched beyond each of its edges, so that a short pan has something to show. */
const MARGIN = 0.15;

/** Columns that a view is resolved into at least, where the intervals are as short: finer than a pixel on most screens. */
const LEAST_COLUMNS = 1600;

/**
 * The tiles to show a view: of the longest step that resolves it into `LEAST_COLUMNS` and is a whole
 * multiple of the station's interval. Tiles that begin after `latestSec` are left out.
 */
export function tilesFor(view: TimeView, intervalSec: number, latestSec: number): Tile[] {
  const stepSec = stepFor(spanSec(view) / LEAST_COLUMNS, intervalSec);
  const lengthSec = stepSec * TILE_COLUMNS;
  const marginSec = spanSec(view) * MARGIN;
  const first = Math.floor(Math.max(0, view.fromSec - marginSec) / lengthSec);
  const endSec = Math.min(view.toSec + marginSec, latestSec);
  const tiles: Tile[] = [];
  for (let n = first; n * lengthSec < endSec; n += 1) {
    tiles.push({ fromSec: n * lengthSec, toSec: (n + 1) * lengthSec, stepSec });
  }
  return tiles;
}

/** Of tiles, those that hold something of the view; the others are its margins. */
export function tilesInView(tiles: readonly Tile[], view: TimeView): Tile[] {
  return tiles.filter((tile) => tile.fromSec < view.toSec && view.fromSec < tile.toSec);
}

function stepFor(mostSec: number, intervalSec: number): number {
  const steps = ladderOf(intervalSec);
  return steps.filter((step) => step <= mostSec).at(-1) ?? steps[0] ?? intervalSec;
}

function ladderOf(intervalSec: number): number[] {
  const onTheHour = STEPS_SEC.filter((step) => step % intervalSec === 0);
  const steps = onTheHour.length > 0 ? onTheHour : STEPS_SEC.map((step) => step * intervalSec);
  return steps.filter((step) => step * TILE_COLUMNS <= LONG_PERIOD_SEC || step % QUARTER_SEC === 0);
}
