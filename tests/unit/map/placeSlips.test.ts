import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { placeSlips } from '../../../src/components/map/model/placeSlips';

const SLIP = { width: 88, height: 34 };
const point = (id: string, x: number, y: number) => ({ id, x, y });

describe('slips on the map', () => {
  it('stand above their places where there is room', () => {
    const [slip] = placeSlips([point('A', 200, 100)], SLIP);
    expect(slip?.x).toBe(200 - 44);
    expect((slip?.y ?? 0) + SLIP.height).toBeLessThan(100);
  });

  it('step aside for one another', () => {
    const slips = placeSlips([point('A', 200, 100), point('B', 210, 104)], SLIP);
    expect(slips.map((s) => s.ids)).toEqual([['A'], ['B']]);
  });

  it('gather stations at one place that find no room, with all of them named', () => {
    const crowd = Array.from({ length: 60 }, (_, i) => point(`S${i}`, 300 + (i % 4), 300 + (i % 3)));
    const slips = placeSlips(crowd, SLIP);
    expect(slips.some((slip) => slip.ids.length > 1)).toBe(true);
    expect(slips.flatMap((slip) => slip.ids).sort()).toEqual(crowd.map((p) => p.id).sort());
  });

  it('never hide one another, and leave no station out', () => {
    const anywhere = fc.record({ x: fc.integer({ min: 0, max: 300 }), y: fc.integer({ min: 0, max: 120 }) });
    fc.assert(
      fc.property(fc.array(anywhere, { maxLength: 60 }), (places) => {
        const points = places.map(({ x, y }, i) => point(`S${i}`, x, y));
        const slips = placeSlips(points, SLIP);
        expect(slips.flatMap((slip) => slip.ids)).toHaveLength(points.length);
        slips.forEach((a, i) =>
          slips.slice(i + 1).forEach((b) => {
            const apart = Math.abs(a.x - b.x) >= SLIP.width || Math.abs(a.y - b.y) >= SLIP.height;
            expect(apart).toBe(true);
          }),
        );
      }),
    );
  });

  it('keep their arrangement when the map is dragged', () => {
    const points = [point('A', 200, 100), point('B', 230, 110), point('C', 500, 90)];
    const moved = points.map((p) => ({ ...p, x: p.x + 37, y: p.y - 12 }));
    const shift = placeSlips(points, SLIP).map((s) => ({
      ...s,
      x: s.x + 37,
      y: s.y - 12,
      pointX: s.pointX + 37,
      pointY: s.pointY - 12,
    }));
    expect(placeSlips(moved, SLIP)).toEqual(shift);
  });

  it('keep within the map where they can', () => {
    const [slip] = placeSlips([point('A', 12, 8)], SLIP, { width: 400, height: 300 });
    expect(slip?.x).toBeGreaterThanOrEqual(0);
    expect(slip?.y).toBeGreaterThanOrEqual(0);
  });
});
