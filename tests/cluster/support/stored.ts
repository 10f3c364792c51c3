import { setTimeout as sleep } from 'node:timers/promises';
import { expect } from 'vitest';
import { db } from '#db/client';
import type { Posting } from './posting';

const COMPUTED_WITHIN_MS = 60_000;

/** Expects that whatever was acknowledged is stored once, and that all that is stored was computed. */
export async function expectAllThere(
  posting: Posting,
  stationIds: ReadonlyMap<string, number>,
): Promise<void> {
  await untilComputed();
  for (const [token, starts] of posting.acknowledged) {
    const stationId = stationIds.get(token) ?? NaN;
    const stored: number[] = await db()('interval_levels')
      .where({ station_id: stationId })
      .orderBy('starts_at')
      .pluck('starts_at');
    expect(new Set(stored).size, 'none is there twice').toBe(stored.length);
    expect(
      starts.filter((startSec) => !stored.includes(startSec)),
      'acknowledged and lost',
    ).toEqual([]);
    const [sums] = (await db()('quarter_hours')
      .where({ station_id: stationId })
      .sum({ validSec: 'valid_sec' })) as [{ validSec: string }];
    expect(Number(sums.validSec), 'what was stored was computed').toBe(60 * stored.length);
  }
}

/** Waits until no mark is left. */
async function untilComputed(): Promise<void> {
  const deadline = performance.now() + COMPUTED_WITHIN_MS;
  while (performance.now() < deadline) {
    const marked = await db()('dirty_marks').first('id');
    if (marked === undefined) return;
    await sleep(200);
  }
  throw new Error('Marks are left.');
}
