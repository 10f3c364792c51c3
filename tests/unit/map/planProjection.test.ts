import { describe, expect, it } from 'vitest';
import { planPoints } from '../../../src/components/map/model/planProjection';

const SIZE = { width: 600, height: 400 };
const place = (code: string, latitude: number, longitude: number) => ({ code, latitude, longitude });

describe('the plan that stands in for the map', () => {
  it('has north up and east to the right, everything within its margin', () => {
    const points = planPoints([place('NW', 54.12, 1.58), place('SE', 54.08, 1.66)], SIZE, 80);
    const [northWest, southEast] = points;
    expect(northWest?.y).toBeLessThan(southEast?.y ?? 0);
    expect(northWest?.x).toBeLessThan(southEast?.x ?? 0);
    for (const { x, y } of points) {
      expect(x).toBeGreaterThanOrEqual(80 - 1e-6);
      expect(x).toBeLessThanOrEqual(520 + 1e-6);
      expect(y).toBeGreaterThanOrEqual(80 - 1e-6);
      expect(y).toBeLessThanOrEqual(320 + 1e-6);
    }
  });

  it('shows as far north as east of the same distance', () => {
    const [middle, north, east] = planPoints(
      [
        place('M', 54, 1),
        place('N', 54.05, 1),
        place('E', 54, 1 + 0.05 / Math.cos((54.025 * Math.PI) / 180)),
      ],
      SIZE,
      80,
    );
    const up = (middle?.y ?? 0) - (north?.y ?? 0);
    const right = (east?.x ?? 0) - (middle?.x ?? 0);
    expect(up).toBeGreaterThan(50);
    expect(right).toBeCloseTo(up, 6);
  });

  it('puts a single station in the middle', () => {
    expect(planPoints([place('A', 54, 1)], SIZE, 80)).toEqual([{ id: 'A', x: 300, y: 200 }]);
  });
});
