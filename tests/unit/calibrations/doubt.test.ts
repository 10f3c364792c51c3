import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { doubtfulStretches, sharedSpan, type CheckedState } from '#lib/services/calibrations/doubt';

const check = (id: number, atSec: number, isGoodBefore: boolean, isGoodAfter = true): CheckedState => ({
  id,
  atSec,
  isGoodBefore,
  isGoodAfter,
});

describe('doubtfulStretches', () => {
  test('a drift makes all since the last good check doubtful', () => {
    expect(doubtfulStretches([check(1, 100, true), check(2, 200, false)])).toEqual([
      { calibrationId: 2, fromSec: 100, toSec: 200 },
    ]);
  });

  test('without a check before, all since the instrument came', () => {
    expect(doubtfulStretches([check(1, 100, false)])).toEqual([{ calibrationId: 1, fromSec: 0, toSec: 100 }]);
  });

  test('an instrument left as it was stays doubtful until a good check', () => {
    const left = [check(1, 100, true), check(2, 200, false, false)];
    expect(doubtfulStretches(left).at(-1)).toEqual({ calibrationId: 2, fromSec: 200, toSec: null });
    expect(doubtfulStretches([...left, check(3, 300, true)]).at(-1)).toEqual({
      calibrationId: 2,
      fromSec: 200,
      toSec: 300,
    });
  });

  const checks = fc
    .array(
      fc.record({ gapSec: fc.integer({ min: 1, max: 1000 }), before: fc.boolean(), after: fc.boolean() }),
      {
        maxLength: 12,
      },
    )
    .map((rows) => {
      let atSec = 0;
      return rows.map(({ gapSec, before, after }, id) => {
        atSec += gapSec;
        return check(id + 1, atSec, before, after);
      });
    });

  test('stretches never overlap, and an instant is doubtful exactly when one of the checks around it is bad', () => {
    fc.assert(
      fc.property(checks, fc.integer({ min: 0, max: 13_000 }), (ordered, atSec) => {
        const holding = doubtfulStretches(ordered).filter(
          ({ fromSec, toSec }) => fromSec <= atSec && (toSec === null || atSec < toSec),
        );
        const before = ordered.filter((one) => one.atSec <= atSec).at(-1);
        const after = ordered.find((one) => one.atSec > atSec);
        const isDoubtful = after?.isGoodBefore === false || before?.isGoodAfter === false;
        expect(holding).toHaveLength(isDoubtful ? 1 : 0);
      }),
    );
  });
});

test('what two stretches share begins and ends in both', () => {
  expect(sharedSpan({ fromSec: 0, toSec: 10 }, { fromSec: 10, toSec: null })).toBeNull();
  expect(sharedSpan({ fromSec: 0, toSec: null }, { fromSec: 10, toSec: null })).toEqual({
    fromSec: 10,
    toSec: null,
  });
  expect(sharedSpan({ fromSec: 0, toSec: 20 }, { fromSec: 10, toSec: null })).toEqual({
    fromSec: 10,
    toSec: 20,
  });
});
