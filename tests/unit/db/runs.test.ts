import fc from 'fast-check';
import { expect, test } from 'vitest';
import { runsOf } from '#db/queries/runs';

test('runs hold exactly the values they are made of, and no two of them could be one', () => {
  fc.assert(
    fc.property(fc.array(fc.integer({ min: 0, max: 60 })), fc.constantFrom(1, 900), (steps, step) => {
      const values = steps.map((at) => at * step);
      const runs = runsOf(values, step);
      const held = runs.flatMap(({ first, last }) =>
        Array.from({ length: (last - first) / step + 1 }, (_, at) => first + at * step),
      );
      expect(held).toEqual([...new Set(values)].sort((a, b) => a - b));
      for (const [at, run] of runs.entries()) expect(run.first).not.toBe((runs[at - 1]?.last ?? NaN) + step);
    }),
  );
});
