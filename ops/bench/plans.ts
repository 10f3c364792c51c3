import { db } from '#db/client';
import { inTransaction, pool } from '#db/queries/connection';
import { markMeasuredQuarters } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { aggregateMarks } from '#ingest/aggregate/aggregate';
import { dayFigures } from '#lib/services/levels/days';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { periodStatistics } from '#lib/services/levels/statistics';
import { printTable } from './support/measure';
import { FIRST_SEC, fillMonth, MONTH_SEC } from './support/months';
import { withOwnSchema } from './support/schema';
import { fill, makeNetwork, makeStation } from './support/station';

/** Plans of the queries that the main questions really ask, taken while they are asked, with a second station in the tables. */
interface Asked {
  sql: string;
  bindings: unknown[];
}

const HIGH_VOLUME = /\b(interval_levels|quarter_hours|day_periods|dirty_marks)\b/;

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'MINUTES', 60);
  await fillMonth(station);
  const other = await makeStation(networkId, 'OTHER', 60);
  await fill(other.id, FIRST_SEC, MONTH_SEC / 60, 60);
  const asked: [question: string, query: Asked][] = [];
  for (const [question, ask] of Object.entries(questionsOf(station))) {
    for (const query of await queriesOf(ask)) asked.push([question, query]);
  }
  await makeBacklog(other);
  await db().raw('ANALYZE TABLE interval_levels, quarter_hours, day_periods, dirty_marks');
  const rows: string[][] = [];
  for (const [question, query] of asked) rows.push([question, ...(await planOf(query))]);
  printTable(['question', 'table', 'access', 'index', 'rows expected', 'extra'], rows);
});

/** A month that waits: with an empty table of marks there would be nothing to plan. */
function makeBacklog({ id }: StationRow): Promise<void> {
  return inTransaction((transaction) => markMeasuredQuarters(id, transaction));
}

function questionsOf(station: StationRow): Record<string, () => Promise<unknown>> {
  const month = { fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC };
  return {
    'statistics of a month': () => periodStatistics({ station, ...month }),
    'statistics of an hour': () =>
      periodStatistics({ station, fromSec: FIRST_SEC + 86_400, toSec: FIRST_SEC + 90_000 }),
    'days of a month': () => dayFigures({ station, fromDate: '2025-01-01', toDate: '2025-01-31' }),
    'spectrogram of a month, 4,000 columns': () => spectrogram({ station, ...month, mostColumns: 4000 }),
    'spectrogram of a month, every minute': () => spectrogram({ station, ...month, mostColumns: 43_200 }),
    'recompute of a day': async () => {
      await pool().raw(
        `INSERT INTO dirty_marks (station_id, quarter_starts_at, marked_at)
         SELECT station_id, starts_at, 0 FROM quarter_hours WHERE station_id = ? AND starts_at < ?`,
        [station.id, FIRST_SEC + 86_400],
      );
      await aggregateMarks(async () => undefined);
    },
  };
}

/** The different statements on the high-volume tables that something asks, inserts of values left out. */
async function queriesOf(ask: () => Promise<unknown>): Promise<Asked[]> {
  const asked = new Map<string, Asked>();
  const note = ({ sql, bindings }: Asked) => {
    const isQuery = /^\s*(select|delete)/i.test(sql) && HIGH_VOLUME.test(sql);
    // The same question of another length, such as a longer list, has the same plan.
    if (isQuery) asked.set(sql.replaceAll(/\?(, \?)*/g, '?'), { sql, bindings });
  };
  db().on('query', note);
  await ask();
  db().off('query', note);
  return [...asked.values()];
}

async function planOf({ sql, bindings }: Asked): Promise<string[]> {
  const [rows] = await db().raw(`EXPLAIN ${sql}`, bindings as string[]);
  const [plan] = rows as Record<string, string | number | null>[];
  const verb = /^\s*delete/i.test(sql) ? 'delete from ' : '';
  return [
    `${verb}${plan?.['table']}`,
    ...['type', 'key', 'rows', 'Extra'].map((name) => String(plan?.[name] ?? '—')),
  ];
}
