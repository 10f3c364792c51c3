import { pool } from '#db/queries/connection';
import { INTERVAL_COLUMNS } from '#db/queries/intervalRows';
import { markQuarterHours } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { periodStatistics } from '#lib/services/levels/statistics';
import { addCopies, copyAggregates } from './support/copies';
import { fleetRow } from './support/fleet';
import { digits, median, msOf, printTable } from './support/measure';
import { asksMemoryMib, workersMemoryMib } from './support/memory';
import { FIRST_SEC, fillMonth, MONTH_SEC, repeatMonth } from './support/months';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';

/**
 * The targets of speed, as ratios to R within one run: R is fetching a station's month of minutes (43,200 rows of 31 thirds) as
 * the driver gives them. Rounds are interleaved with R; each ratio is of medians. `npx tsx ops/bench/targets.ts`, about 2 min.
 */
type Work = () => Promise<unknown>;

const MONTH = { fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC };
const YEAR = { fromSec: FIRST_SEC, toSec: FIRST_SEC + 12 * MONTH_SEC };
const ROUNDS = 15;
/** Before those that count, so that everything is compiled as in a process that has run for a while. */
const WARM_ROUNDS = 5;
const rows: string[][] = [];

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'MINUTES', 60);
  const seconds = await makeStation(networkId, 'SECONDS', 1);
  await fillMonth(station);
  await copyAggregates(station.id, seconds.id);
  await addCopies(station, 6, 'NEIGHBOUR');
  const month = () => periodStatistics({ station, ...MONTH });
  const few = await measure(station, {
    month,
    minutes: () => spectrogram({ station, ...MONTH, mostColumns: 43_200 }),
    decimated: () => spectrogram({ station: seconds, ...MONTH, mostColumns: 2000 }),
  });
  note('statistics of a month', few['month'], '≤ 0.5');
  note('spectrogram of a month, every minute', few['minutes'], '≤ 2');
  note('spectrogram of a month of seconds, 2,000 columns', few['decimated'], '≤ 3');
  note(
    'recompute of a month',
    (await measure(station, { recompute: () => recompute(station) }, 9))['recompute'],
    '≤ 8',
  );
  const worker = await workersMemoryMib(station);
  await repeatMonth(station, 24);
  const long = await measure(station, { month, year: () => periodStatistics({ station, ...YEAR }) });
  note('statistics of a year', long['year'], '≤ 3');
  note('statistics of a month of 24', long['month'], '');
  await addCopies(station, 92, 'FURTHER');
  const many = await measure(station, { month });
  note('statistics of a month, 100 stations', many['month'], '');
  printTable(['what', '÷ R', 'CPU ÷ CPU of R', 'ms', 'R ms', 'target'], rows);
  const growth = (of?: Ratio) => digits((of?.ratio ?? NaN) / (few['month']?.ratio ?? NaN));
  printTable(
    ['what', 'measured', 'target'],
    [
      ['a month when there are 24 ÷ when it is alone', growth(long['month']), '0.8–1.2'],
      ['a month among 100 stations ÷ among 8', growth(many['month']), '0.8–1.2'],
      await fleetRow(),
      ['highest resident MiB, worker that recomputes a month', digits(worker), '< 400'],
      ['highest resident MiB, process that answers all of these', digits(await asksMemoryMib()), '< 400'],
    ],
  );
});

/** Medians of one work, by the clock and by processor time of this process alone. */
interface Ratio {
  ratio: number;
  cpuRatio: number;
  ms: number;
  againstMs: number;
}

/** What every round of one work took. */
interface Taken {
  ms: number[];
  cpuMs: number[];
}

/** Every work and R, turn by turn, after some for warmth. */
async function measure(
  station: StationRow,
  works: Record<string, Work>,
  rounds = ROUNDS,
): Promise<Record<string, Ratio>> {
  const fetching: Taken = { ms: [], cpuMs: [] };
  const times = Object.entries(works).map(([name, work]) => ({ name, work, ms: [], cpuMs: [] }));
  for (let round = -WARM_ROUNDS; round < rounds; round += 1) {
    await take(() => fetchMonth(station), fetching, round);
    for (const taken of times) await take(taken.work, taken, round);
  }
  return Object.fromEntries(times.map(({ name, ...taken }) => [name, ratioOf(taken, fetching)]));
}

async function take(work: Work, into: Taken, round: number): Promise<void> {
  const before = process.cpuUsage();
  const tookMs = await msOf(work);
  const { user, system } = process.cpuUsage(before);
  if (round < 0) return;
  into.ms.push(tookMs);
  into.cpuMs.push((user + system) / 1000);
}

function ratioOf({ ms, cpuMs }: Taken, against: Taken): Ratio {
  return {
    ratio: median(ms) / median(against.ms),
    cpuRatio: median(cpuMs) / median(against.cpuMs),
    ms: median(ms),
    againstMs: median(against.ms),
  };
}

function note(what: string, measured: Ratio | undefined, target: string): void {
  const { ratio = NaN, cpuRatio = NaN, ms = NaN, againstMs = NaN } = measured ?? {};
  rows.push([what, ...[ratio, cpuRatio, ms, againstMs].map(digits), target]);
}

/** R. */
async function fetchMonth({ id }: StationRow): Promise<void> {
  await pool()
    .raw(
      `SELECT ${INTERVAL_COLUMNS} FROM interval_levels WHERE station_id = ? AND starts_at >= ? AND starts_at < ?`,
      [id, MONTH.fromSec, MONTH.toSec],
    )
    .options({ rowsAsArray: true });
}

async function recompute({ id }: StationRow): Promise<void> {
  await markQuarterHours(id, MONTH.fromSec, MONTH.toSec, pool());
  await aggregateAll(async () => undefined);
}
