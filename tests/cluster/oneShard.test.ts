import { expect, test } from 'vitest';
import { pool } from '#db/queries/connection';
import { listSettings } from '#db/queries/networks';
import { dataServers, onEach } from '#db/sharding/dataServers';
import { bucketOf } from '#db/sharding/kinds';
import { fillMonth, FIRST_SEC, MONTH_SEC } from '#ops/bench/support/months';
import { makeNetwork, makeStation } from '#ops/bench/support/station';
import { currentSums } from '#lib/services/levels/currentSums';
import { useFreshSchema } from '../integration/support/freshSchema';

useFreshSchema();

test('figures of one station ask the server of its bucket alone', async () => {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'ONE', 60);
  await fillMonth(station);
  const bucket = bucketOf(station.id);
  const before = await rowsRead();
  const source = { station, timeline: await listSettings(networkId), validity: 'rules' as const };
  const sums = await currentSums(
    source,
    { fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC },
    { bandClasses: true },
    pool(),
  );
  const after = await rowsRead();
  const own = bucket % dataServers().length;
  expect(sums.sums.validSec).toBeGreaterThan(0);
  for (const [at, rows] of after.entries()) {
    const read = rows - (before[at] ?? NaN);
    if (at === own) expect(read, 'its server').toBeGreaterThan(0);
    else expect(read, 'another server').toBe(0);
  }
}, 120_000);

/** Rows of tables that each data server has read since it was started. */
function rowsRead(): Promise<number[]> {
  return onEach(dataServers(), async (connection) => {
    const [rows] = await connection.query("SHOW GLOBAL STATUS LIKE 'Innodb_rows_read'");
    return Number((rows as { Value: string }[])[0]?.Value);
  });
}
