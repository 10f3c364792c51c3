import { describe, expect, it } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import { NOTHING_MARKED } from '../../../src/components/strip/model/interaction';
import { bandPlaceIn, cornerOn, interactionOn, shifted } from '../../../src/components/strip/model/track';
import { NINE_THIRDS } from './columns';

const WIDER = bandsOf(3).slice(6, 20);

describe('marks on another strip of the axis', () => {
  it('finds a band by what it is, not by its place', () => {
    expect(bandPlaceIn(0, NINE_THIRDS, WIDER)).toBe(2);
    expect(bandPlaceIn(0, WIDER, NINE_THIRDS)).toBeNull();
    expect(bandPlaceIn(0, NINE_THIRDS, bandsOf(1))).toBeNull();
  });

  it('comes back where it was', () => {
    const there = { bySec: -3600, from: NINE_THIRDS, to: WIDER };
    const back = { bySec: 3600, from: WIDER, to: NINE_THIRDS };
    const corner = { sec: 10_000, bandAt: 4 };
    expect(cornerOn(corner, there)).toEqual({ sec: 6400, bandAt: 6 });
    expect(cornerOn(cornerOn(corner, there), back)).toEqual(corner);
  });

  it('moves a selection in time and keeps its bands', () => {
    const bands = { fraction: 3, lowestIndex: -11, highestIndex: -9 } as const;
    const selection = { fromSec: 100, toSec: 200, bands };
    const marked = { ...NOTHING_MARKED, selection };
    const moved = interactionOn(marked, { bySec: 50, from: NINE_THIRDS, to: WIDER });
    expect(moved.selection).toEqual({ fromSec: 150, toSec: 250, bands });
    expect(shifted(selection, 0)).toBe(selection);
  });
});
