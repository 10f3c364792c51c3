import fc from 'fast-check';
import { expect, test } from 'vitest';
import { db } from '#db/client';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { useFreshSchema } from '../integration/support/freshSchema';

useFreshSchema();

const PERCENTS = [1, 5, 10, 50, 90, 95, 99];

/**
 * MariaDB's own PERCENTILE_DISC (SQL:2003, inverse of the distribution function without interpolation): the smallest value
 * whose share of values at or below reaches a fraction. L_N is that of the fraction 1 − N/100.
 */
async function byDatabase(tenths: readonly number[], percent: number): Promise<number> {
  const values = tenths.map((value) => `SELECT ${value} AS level`).join(' UNION ALL ');
  const fraction = ((100 - percent) / 100).toFixed(2);
  const [rows] = (await db().raw(
    `SELECT PERCENTILE_DISC(${fraction}) WITHIN GROUP (ORDER BY level) OVER () AS found FROM (${values}) AS samples LIMIT 1`,
  )) as [{ found: number }[]];
  return Number(rows[0]?.found);
}

test('levels exceeded for N % of the time are the database’s discrete percentiles', async () => {
  const samples = fc.array(fc.integer({ min: 250, max: 950 }), { minLength: 1, maxLength: 120 });
  await fc.assert(
    fc.asyncProperty(samples, async (tenths) => {
      const counts = new LevelClassCounts();
      for (const value of tenths) counts.addTenths(value, 60);
      for (const percent of PERCENTS) {
        expect(counts.exceededTenths(percent), `L${percent} of ${tenths.length}`).toBe(
          await byDatabase(tenths, percent),
        );
      }
    }),
    { numRuns: 40 },
  );
});
