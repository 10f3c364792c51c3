import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { markMeasuredQuarters } from '#db/queries/quarterHours';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { makeTraces } from '#ingest/traces/makeTraces';
import { FIRST_SEC } from '../bench/support/months';
import { fill, makeNetwork, makeStation } from '../bench/support/station';
import { withOwnSchema } from '../bench/support/schema';
import type { TableSize } from './model';

const DAY_SEC = 86_400;

export interface Measured {
  tables: Record<string, TableSize>;
  /** Seconds of processor time of recomputing everything once. */
  recomputeSec: number;
}

/** Fills a database of its own with a scaled-down network of 31 bands, computes everything, and measures what the tables take. */
export async function measureScaledDown(
  stations: number,
  intervalSec: number,
  days: number,
): Promise<Measured> {
  let measured: Measured | undefined;
  await withOwnSchema(async () => {
    const networkId = await makeNetwork();
    for (let at = 0; at < stations; at += 1) {
      const { id } = await makeStation(networkId, `CAPACITY-${at}`, intervalSec);
      await fill(id, FIRST_SEC, (days * DAY_SEC) / intervalSec, intervalSec);
      await inTransaction((transaction) => markMeasuredQuarters(id, transaction));
    }
    const before = process.cpuUsage();
    await aggregateAll(async () => undefined);
    const { user, system } = process.cpuUsage(before);
    while ((await makeTraces(new Date((FIRST_SEC + (days + 2) * DAY_SEC) * 1000))) > 0);
    measured = { tables: await sizes(), recomputeSec: (user + system) / 1e6 };
  });
  if (!measured) throw new Error('Nothing was measured.');
  return measured;
}

async function sizes(): Promise<Record<string, TableSize>> {
  const found: Record<string, TableSize> = {};
  for (const table of ['interval_levels', 'quarter_hours', 'day_periods', 'station_day_traces']) {
    await db().raw('ANALYZE TABLE ??', [table]);
    const [[size]] = (await db().raw(
      'SELECT data_length + index_length AS bytes FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name = ?',
      [table],
    )) as [{ bytes: number }[]];
    const rows = Number((await db()(table).count({ count: '*' }).first())?.count);
    const bytes = Number(size?.bytes);
    found[table] = { rows, bytes, bytesARow: bytes / rows };
  }
  return found;
}
