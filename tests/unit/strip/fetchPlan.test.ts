import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fetchPlan, isServedBy, LONG_PERIOD_SEC } from '../../../src/components/strip/model/fetchPlan';

const from = 1_773_748_800;
const LATEST = 4_000_000_000;

describe('what is fetched for a view', () => {
  it('takes one-minute columns for a day on 1,500 pixels', () => {
    const plan = fetchPlan({ fromSec: from, toSec: from + 86_400 }, 1500, 60, LATEST);
    expect(plan.stepSec).toBe(60);
    expect(plan.fromSec).toBeLessThan(from);
    expect(plan.toSec).toBeGreaterThan(from + 86_400);
  });

  it('takes whole quarter-hours for a month', () => {
    const plan = fetchPlan({ fromSec: from, toSec: from + 31 * 86_400 }, 1500, 60, LATEST);
    expect(plan.stepSec).toBe(1800);
  });

  it('holds the view in whole steps of the interval on one grid, within what one answer may hold', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 600, max: 400 * 86_400 }),
        fc.integer({ min: 300, max: 4000 }),
        fc.constantFrom(1, 10, 60, 300, 900, 3600),
        fc.integer({ min: 0, max: 100_000 }),
        (lengthSec, widthPx, intervalSec, shift) => {
          const view = { fromSec: from + shift, toSec: from + shift + lengthSec };
          const plan = fetchPlan(view, widthPx, intervalSec, LATEST);
          expect(plan.columns).toBeLessThanOrEqual(4000);
          expect(plan.columns * plan.stepSec).toBe(plan.toSec - plan.fromSec);
          expect(plan.stepSec % intervalSec).toBe(0);
          expect(plan.fromSec % plan.stepSec).toBe(0);
          expect(plan.fromSec).toBeLessThanOrEqual(view.fromSec);
          expect(plan.toSec).toBeGreaterThanOrEqual(view.toSec);
          if (plan.toSec - plan.fromSec > LONG_PERIOD_SEC) expect(plan.stepSec % 900).toBe(0);
        },
      ),
    );
  });

  it('asks for nothing beyond now', () => {
    const plan = fetchPlan({ fromSec: from, toSec: from + 86_400 }, 1000, 60, from + 3600);
    expect(plan.toSec).toBeLessThanOrEqual(from + 3600 + plan.stepSec);
  });
});

describe('whether fetched columns serve a view', () => {
  const view = { fromSec: from, toSec: from + 86_400 };
  const plan = fetchPlan(view, 1500, 60, LATEST);

  it('holds for a short pan within the margin and not for a long one or another step', () => {
    const panned = { fromSec: from + 7200, toSec: from + 93_600 };
    const nextPlan = fetchPlan(panned, 1500, 60, LATEST);
    expect(isServedBy(nextPlan, panned, plan)).toBe(true);
    const far = { fromSec: from + 40_000, toSec: from + 126_400 };
    expect(isServedBy(fetchPlan(far, 1500, 60, LATEST), far, plan)).toBe(false);
    const near = { fromSec: from, toSec: from + 864_000 };
    expect(isServedBy(fetchPlan(near, 1500, 60, LATEST), near, plan)).toBe(false);
  });
});
