import { spawnSync } from 'node:child_process';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { periodStatistics } from '#lib/services/levels/statistics';
import { addCopies, copyAggregates } from './support/copies';
import { fleetRow } from './support/fleet';
import { monthBySize } from './support/growth';
import { WEB_ARGUMENTS } from '#ops/start/webArguments';
import { WORKER_ARGUMENTS } from '#ops/start/workerArguments';
import { digits, printTable } from './support/measure';
import { asksMemoryMib, workersMemoryMib } from './support/memory';
import { FIRST_SEC, fillMonth, MONTH_SEC, repeatMonth } from './support/months';
import { measure, type Ratio, type Work } from './support/ratios';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';

/**
 * The targets of speed, as ratios to R within one run: R is fetching a station's month of minutes (43,200 rows of 31 thirds) as
 * the driver gives them. Each work takes turns with R, so that no work pays for collecting what another left, and tables of several sizes
 * take turns with one another; each ratio is of medians. As the web, it needs
 * room for young objects: `node --max-semi-space-size=32 --import tsx ops/bench/targets.ts`, about 3 min.
 */
const MONTH = { fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC };
const YEAR = { fromSec: FIRST_SEC, toSec: FIRST_SEC + 12 * MONTH_SEC };
const ROUNDS = 15;
const rows: string[][] = [];
if (WEB_ARGUMENTS.some((argument) => !process.execArgv.includes(argument)))
  throw new Error(`Start it as the web is started: node ${WEB_ARGUMENTS.join(' ')} ops/bench/targets.ts`);

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'MINUTES', 60);
  const seconds = await makeStation(networkId, 'SECONDS', 1);
  await fillMonth(station);
  await copyAggregates(station.id, seconds.id);
  await addCopies(station, 6, 'NEIGHBOUR');
  const month = () => periodStatistics({ station, ...MONTH });
  const one = (work: Work) => measure(station, { work }, ROUNDS).then(({ work: measured }) => measured);
  const few = {
    month: await one(month),
    minutes: await one(() => spectrogram({ station, ...MONTH, mostColumns: 43_200 })),
    decimated: await one(() => spectrogram({ station: seconds, ...MONTH, mostColumns: 2000 })),
  };
  note('statistics of a month', few.month, '≤ 0.5');
  note('spectrogram of a month, every minute', few.minutes, '≤ 2');
  note('spectrogram of a month of seconds, 2,000 columns', few.decimated, '≤ 3');
  note('recompute of a month', recomputing(), '≤ 8');
  const worker = await workersMemoryMib(station);
  await repeatMonth(station, 24);
  note('statistics of a year', await one(() => periodStatistics({ station, ...YEAR })), '≤ 3');
  printTable(['what', '÷ R', 'CPU ÷ CPU of R', 'ms', 'R ms', 'target'], rows);
  const [alone = NaN, long = NaN, many = NaN] = await monthBySize([
    { months: 1, stations: 8 },
    { months: 24, stations: 8 },
    { months: 1, stations: 100 },
  ]);
  printTable(
    ['what', 'measured', 'target'],
    [
      [`a month when there are 24 ÷ when it is alone (${digits(alone)} ms)`, digits(long / alone), '0.8–1.2'],
      ['a month among 100 stations ÷ among 8', digits(many / alone), '0.8–1.2'],
      await fleetRow(),
      ['highest resident MiB, worker that recomputes a month', digits(worker), '< 400'],
      ['highest resident MiB, process that answers all of these', digits(await asksMemoryMib()), '< 400'],
    ],
  );
});

/** Recomputing in a process of its own, with the arguments that the worker has; R is measured there, too. */
function recomputing(): Ratio {
  const { stdout } = spawnSync(process.execPath, [...WORKER_ARGUMENTS, 'ops/bench/support/recomputing.ts'], {
    encoding: 'utf8',
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  return JSON.parse(stdout) as Ratio;
}

function note(what: string, measured: Ratio | undefined, target: string): void {
  const { ratio = NaN, cpuRatio = NaN, ms = NaN, againstMs = NaN } = measured ?? {};
  rows.push([what, ...[ratio, cpuRatio, ms, againstMs].map(digits), target]);
}
