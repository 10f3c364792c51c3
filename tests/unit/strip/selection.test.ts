import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import { selectionBetween } from '../../../src/components/strip/model/dragSelection';
import {
  formatSelection,
  parseSelection,
  selectedBands,
} from '../../../src/components/strip/model/selection';

const thirds = bandsOf(3);

describe('a selection in the address', () => {
  it('reads as it is written', () => {
    const selection = {
      fromSec: Date.parse('2026-03-17T20:58:00Z') / 1000,
      toSec: Date.parse('2026-03-17T22:04:00Z') / 1000,
      bands: { fraction: 3 as const, lowestIndex: -11, highestIndex: -9 },
    };
    expect(formatSelection(selection)).toBe('2026-03-17T20:58:00Z/2026-03-17T22:04:00Z/80-125');
    expect(parseSelection(formatSelection(selection))).toEqual(selection);
  });

  it('comes back the same whatever it is', () => {
    const band = fc.integer({ min: 0, max: thirds.length - 1 });
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 2e9 }),
        fc.integer({ min: 1, max: 1e7 }),
        band,
        band,
        (from, length, a, b) => {
          const corners = [
            { sec: from, bandAt: a },
            { sec: from + length, bandAt: b },
          ] as const;
          const selection = selectionBetween(corners[0], corners[1], 1, thirds);
          expect(parseSelection(formatSelection(selection))).toEqual(selection);
        },
      ),
    );
  });

  it.each([
    '',
    'x/y',
    '2026-03-17T22:04:00Z/2026-03-17T20:58:00Z',
    '2026-03-17T20:58:00Z/2026-03-17T22:04:00Z/81-125',
    '2026-03-17T20:58:00Z/2026-03-17T22:04:00Z/125-80',
  ])('is refused as %j', (text) => expect(parseSelection(text)).toBeNull());
});

describe('a selection by dragging', () => {
  it('takes whole intervals, whichever corner comes first', () => {
    const a = { sec: 130, bandAt: 4 };
    const b = { sec: 61, bandAt: 2 };
    const selection = selectionBetween(a, b, 60, thirds);
    expect(selection).toEqual(selectionBetween(b, a, 60, thirds));
    expect(selection).toMatchObject({
      fromSec: 60,
      toSec: 180,
      bands: { lowestIndex: -17, highestIndex: -15 },
    });
  });

  it('takes one interval at least', () => {
    expect(selectionBetween({ sec: 120, bandAt: null }, { sec: 120, bandAt: null }, 60, thirds)).toEqual({
      fromSec: 120,
      toSec: 180,
      bands: null,
    });
  });

  it('names no bands when it takes them all in', () => {
    expect(selectionBetween({ sec: 0, bandAt: 0 }, { sec: 60, bandAt: 32 }, 60, thirds).bands).toBeNull();
  });
});

describe('the bands of a selection', () => {
  it('are the thirds within an octave when octaves were marked', () => {
    const selection = {
      fromSec: 0,
      toSec: 60,
      bands: { fraction: 1 as const, lowestIndex: -9, highestIndex: -9 },
    };
    expect(selectedBands(selection, thirds).map((band) => band.nominalHz)).toEqual([100, 125, 160]);
  });

  it('are all of them when it names none', () => {
    expect(selectedBands({ fromSec: 0, toSec: 60, bands: null }, thirds)).toHaveLength(33);
  });
});
