import { parseArgs } from 'node:util';
import { measureScaledDown } from './capacity/measure';
import { capacityOf, type Plan, type TableSize } from './capacity/model';
import { printTable } from './bench/support/measure';

/**
 * What a network needs: `npx tsx ops/capacity.ts --stations 10000 --interval 60`. With `--measure` the plan is scaled down to `--stations` and
 * `--days` as they are, stored and computed in a database of its own, and compared with what the model says of it.
 */
const { values } = parseArgs({
  options: {
    stations: { type: 'string', default: '100' },
    interval: { type: 'string', default: '60' },
    bands: { type: 'string', default: '31' },
    days: { type: 'string', default: '365' },
    post: { type: 'string', default: '60' },
    measure: { type: 'boolean', default: false },
  },
});
const days = Number(values.days);
const plan: Plan = {
  stations: Number(values.stations),
  intervalSec: Number(values.interval),
  bands: values.measure ? 31 : Number(values.bands),
  keptDays: days,
  computedDays: days,
  postSec: Math.max(Number(values.post), Number(values.interval)),
};
if (!Object.values(plan).every((value) => Number.isFinite(value) && value > 0))
  throw new Error('Stations, interval, bands, days and post are numbers above 0.');

const gib = (bytes: number) => (bytes / 2 ** 30).toPrecision(3);
const capacity = capacityOf(plan);
const measured = values.measure ? await measureScaledDown(plan.stations, plan.intervalSec, days) : null;
const rowOf = ([table, { rows, bytesARow, bytes }]: [string, TableSize]) => {
  const found = measured?.tables[table];
  const told = found
    ? [String(found.rows), found.bytesARow.toFixed(0), (bytes / found.bytes).toFixed(2)]
    : [];
  return [table, rows.toExponential(2), bytesARow.toFixed(0), gib(bytes), ...told];
};
const heads = ['table', 'rows', 'bytes a row', 'GiB'];
printTable(
  measured ? [...heads, 'rows measured', 'bytes a row measured', 'model ÷ measured'] : heads,
  Object.entries(capacity.tables).map(rowOf),
);
console.log(`
Disk ${gib(capacity.diskBytes)} GiB, memory of databases ${gib(capacity.memoryBytes)} GiB; ${capacity.intervalsASec.toFixed(1)} intervals/s in ${capacity.postsASec.toFixed(1)} posts/s;
cores of webs ${capacity.webCores.toFixed(2)}, of workers ${capacity.workerCores.toFixed(2)}.`);
if (measured)
  console.log(`Recomputing all of it once: ${measured.recomputeSec.toFixed(1)} s of processor time.`);
process.exit(0);
