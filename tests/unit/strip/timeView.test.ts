import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { panView, pxAtSec, secAtPx, spanSec, zoomView } from '../../../src/components/strip/model/timeView';

const bounds = { shortestSec: 600, longestSec: 62 * 86_400, latestSec: 2_000_000_000 };
const view = { fromSec: 1_773_748_800, toSec: 1_773_748_800 + 86_400 };

describe('zooming', () => {
  it('keeps the instant under the pointer where it is', () => {
    const about = view.fromSec + 20_000;
    const zoomed = zoomView(view, 0.5, about, bounds);
    expect(spanSec(zoomed)).toBe(43_200);
    expect(pxAtSec(zoomed, 800, about)).toBeCloseTo(pxAtSec(view, 800, about), 6);
  });

  it('never leaves the bounds, whatever is done in whatever order', () => {
    const step = fc.oneof(
      fc.record({
        factor: fc.double({ min: 0.1, max: 10, noNaN: true }),
        share: fc.double({ min: 0, max: 1, noNaN: true }),
      }),
      fc.record({ bySec: fc.integer({ min: -10_000_000, max: 400_000_000 }) }),
    );
    fc.assert(
      fc.property(fc.array(step, { maxLength: 30 }), (steps) => {
        let now = view;
        for (const s of steps) {
          now =
            'bySec' in s
              ? panView(now, s.bySec, bounds)
              : zoomView(now, s.factor, secAtPx(now, 1, s.share), bounds);
          expect(spanSec(now)).toBeGreaterThanOrEqual(bounds.shortestSec - 1e-3);
          expect(spanSec(now)).toBeLessThanOrEqual(bounds.longestSec + 1e-3);
          expect(now.toSec).toBeLessThanOrEqual(bounds.latestSec + 1e-3);
        }
      }),
    );
  });
});

describe('panning', () => {
  it('moves by the seconds asked for and stops at the latest instant with its length kept', () => {
    expect(panView(view, -3600, bounds).fromSec).toBe(view.fromSec - 3600);
    const atEnd = panView(view, 1e9, bounds);
    expect(atEnd.toSec).toBe(bounds.latestSec);
    expect(spanSec(atEnd)).toBe(86_400);
  });
});

describe('places on the axis', () => {
  it('turns into an instant and back', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 900 }), (px) => {
        expect(pxAtSec(view, 900, secAtPx(view, 900, px))).toBeCloseTo(px, 6);
      }),
    );
  });
});
