import type { Connection, RowDataPacket } from 'mysql2/promise';
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
  await onEach(dataServers(), (connection) =>
    connection.query(
      "SET GLOBAL log_output = 'TABLE'; TRUNCATE mysql.general_log; SET GLOBAL general_log = 1",
    ),
  );
  const source = { station, timeline: await listSettings(networkId), validity: 'rules' as const };
  const period = { fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC };
  const { sums } = await currentSums(source, period, { bandClasses: true }, pool());
  const asked = await onEach(dataServers(), questionsAndStop);
  expect(sums.validSec).toBeGreaterThan(0);
  for (const [at, questions] of asked.entries())
    if (at === bucket % dataServers().length) expect(questions, 'its server').toBeGreaterThan(0);
    else expect(questions, 'another server').toBe(0);
}, 120_000);

/** How often rows of our tables were asked for while all questions were noted, which ends. */
async function questionsAndStop(connection: Connection): Promise<number> {
  await connection.query('SET GLOBAL general_log = 0');
  const [rows] = await connection.query<RowDataPacket[]>(
    "SELECT COUNT(*) AS count FROM mysql.general_log WHERE argument REGEXP '^select .*from `?[a-z0-9_]+`?[.]`?(quarter_hours|day_periods|interval_levels|dirty_marks)_[0-9]{2}'",
  );
  return Number(rows[0]?.['count']);
}
