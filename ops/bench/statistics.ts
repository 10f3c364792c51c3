import { pool } from '#db/queries/connection';
import { listSettings } from '#db/queries/networks';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { currentSums } from '#lib/services/levels/currentSums';
import { sumIntervals, type LevelSource } from '#lib/services/levels/intervalSums';
import { compare, digits, median, printTable } from './support/measure';
import { FIRST_SEC, fillMonth, MONTH_SEC, repeatMonth } from './support/months';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';

/** Figures of a month and of twelve months of minutes from what is stored computed, against straight from the intervals. */
const OFF_SEC = MONTH_SEC - 437;
const ASKED = [
  { name: 'month', lengthSec: MONTH_SEC, bandClasses: false, turns: 3 },
  { name: 'month, bands with L_N', lengthSec: MONTH_SEC, bandClasses: true, turns: 3 },
  { name: 'month off the quarter-hour, bands with L_N', lengthSec: OFF_SEC, bandClasses: true, turns: 3 },
  { name: 'twelve months', lengthSec: 12 * MONTH_SEC, bandClasses: false, turns: 1 },
  { name: 'twelve months, bands with L_N', lengthSec: 12 * MONTH_SEC, bandClasses: true, turns: 1 },
];

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'MINUTES', 60);
  await fillMonth(station);
  await repeatMonth(station);
  const source: LevelSource = { station, timeline: await listSettings(networkId), validity: 'rules' };
  const rows: string[][] = [];
  for (const { name, ...asked } of ASKED) rows.push([name, ...(await row(source, asked))]);
  printTable(
    ['figures of', 'intervals ÷ aggregates', 'aggregates ms', 'intervals ms', 'difference dB'],
    rows,
  );
});

async function row(
  source: LevelSource,
  { lengthSec, bandClasses, turns }: Omit<(typeof ASKED)[number], 'name'>,
): Promise<string[]> {
  const period = { fromSec: FIRST_SEC, toSec: FIRST_SEC + lengthSec };
  let stored: PeriodAccumulator | undefined;
  let direct: PeriodAccumulator | undefined;
  const { ms, againstMs } = await compare(
    turns,
    async () => (stored = await currentSums(source, period, { bandClasses }, pool())),
    async () => (direct = await sumIntervals(source, period, { bandClasses }, pool())),
  );
  if (stored?.sums.validSec !== direct?.sums.validSec) throw new Error('The two ways count other seconds.');
  const differenceDb = Math.abs((stored?.laeqDb() ?? NaN) - (direct?.laeqDb() ?? NaN));
  return [
    digits(median(againstMs) / median(ms)),
    digits(median(ms)),
    digits(median(againstMs)),
    differenceDb.toExponential(0),
  ];
}
