import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { LONG_PERIOD_SEC, TILE_COLUMNS, tilesFor } from '../../../src/components/strip/model/tiles';

const from = 1_773_748_800;
const LATEST = 4_000_000_000;

describe('the tiles of a view', () => {
  it('are the intervals themselves for a day', () => {
    const [first] = tilesFor({ fromSec: from, toSec: from + 86_400 }, 60, LATEST);
    expect(first).toMatchObject({ stepSec: 60 });
  });

  it('have whole quarter-hours for a month', () => {
    const [first] = tilesFor({ fromSec: from, toSec: from + 31 * 86_400 }, 60, LATEST);
    expect(first).toMatchObject({ stepSec: 900 });
  });

  it('hold the view without a seam, in whole steps of the interval, a few at a time', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 600, max: 400 * 86_400 }),
        fc.constantFrom(1, 7, 10, 60, 300, 3600),
        fc.integer({ min: 0, max: 100_000 }),
        (lengthSec, intervalSec, shift) => {
          const view = { fromSec: from + shift, toSec: from + shift + lengthSec };
          const tiles = tilesFor(view, intervalSec, LATEST);
          expect(tiles.length).toBeLessThanOrEqual(3600 % intervalSec === 0 ? 5 : 25);
          expect(tiles[0]?.fromSec).toBeLessThanOrEqual(view.fromSec);
          expect(tiles.at(-1)?.toSec).toBeGreaterThanOrEqual(view.toSec);
          tiles.forEach((tile, n) => {
            expect(tile.toSec - tile.fromSec).toBe(tile.stepSec * TILE_COLUMNS);
            expect(tile.stepSec % intervalSec).toBe(0);
            expect(tile.fromSec % tile.stepSec).toBe(0);
            if (n > 0) expect(tile.fromSec).toBe(tiles[n - 1]?.toSec);
            if (tile.toSec - tile.fromSec > LONG_PERIOD_SEC) expect(tile.stepSec % 900).toBe(0);
          });
        },
      ),
    );
  });

  it('are the same ones after a short pan', () => {
    const view = { fromSec: from, toSec: from + 43_200 };
    const panned = { fromSec: from + 1800, toSec: from + 45_000 };
    expect(tilesFor(panned, 60, LATEST)).toEqual(tilesFor(view, 60, LATEST));
  });

  it('end with the one that holds the latest instant', () => {
    const tiles = tilesFor({ fromSec: from, toSec: from + 10 * 86_400 }, 60, from + 3600);
    expect(tiles.at(-1)?.fromSec).toBeLessThan(from + 3600);
    expect(tiles).toHaveLength(1);
  });
});
