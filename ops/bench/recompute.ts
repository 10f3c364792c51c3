import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { selectIntervals } from '#db/queries/intervals';
import { markMeasuredQuarters } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { compare, digits, median, printTable } from './support/measure';
import { residentMib, untilNothingWaits } from './support/memory';
import { withOwnSchema } from './support/schema';
import { fill, makeNetwork, makeStation } from './support/station';
import { WORKER_ARGUMENTS } from '#ops/start/workerArguments';

/**
 * Recomputing a civil day of samples of a second (86,400) and of a minute (1,440), against only reading its intervals; and the
 * memory of a worker that does so.
 */
const FIRST_SEC = Date.parse('2026-01-05T00:00:00Z') / 1000;
const DAY_SEC = 86_400;
const nothing = async () => undefined;

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const seconds = await makeStation(networkId, 'SECONDS', 1);
  const minutes = await makeStation(networkId, 'MINUTES', 60);
  await fill(seconds.id, FIRST_SEC, DAY_SEC, 1);
  await fill(minutes.id, FIRST_SEC, DAY_SEC / 60, 60);
  printTable(
    ['a day of samples of', 'recompute ÷ read', 'recompute ms', 'read ms', 'intervals/s'],
    [await row(seconds, 3), await row(minutes, 7)],
  );
  await mark(seconds);
  await watchWorker();
});

async function row(station: StationRow, turns: number): Promise<string[]> {
  const { ms, againstMs } = await compare(
    turns,
    async () => {
      await mark(station);
      await aggregateAll(nothing);
    },
    () => selectIntervals(station.id, FIRST_SEC, FIRST_SEC + DAY_SEC),
  );
  const perSec = (1000 * DAY_SEC) / station.intervalSec / median(ms);
  return [
    `${station.intervalSec} s`,
    digits(median(ms) / median(againstMs)),
    digits(median(ms)),
    digits(median(againstMs)),
    digits(perSec),
  ];
}

function mark({ id }: StationRow): Promise<void> {
  return inTransaction((transaction) => markMeasuredQuarters(id, transaction));
}

/** Runs a worker until nothing is left to do, five rounds, and prints its resident memory. */
async function watchWorker(): Promise<void> {
  const worker = spawn(process.execPath, [...WORKER_ARGUMENTS, 'ingest/worker.ts'], { stdio: 'ignore' });
  const rows: string[][] = [];
  try {
    for (let round = 1; round <= 3; round += 1) {
      await untilNothingWaits();
      const { now, highest } = residentMib(worker.pid ?? NaN);
      rows.push([String(round), digits(now), digits(highest)]);
      if (round < 3)
        await db().raw(
          'INSERT INTO dirty_marks (station_id, quarter_starts_at, marked_at) SELECT station_id, starts_at, 0 FROM quarter_hours',
        );
    }
  } finally {
    worker.kill('SIGTERM');
    await once(worker, 'exit');
  }
  printTable(['worker, after day', 'resident MiB', 'highest resident MiB'], rows);
}
