import { readFileSync } from 'node:fs';
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as sleep } from 'node:timers/promises';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { markMeasuredQuarters } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { WEB_ARGUMENTS } from '#ops/start/webArguments';
import { WORKER_ARGUMENTS } from '#ops/start/workerArguments';

/** Highest resident memory of a worker, in MiB, that recomputes everything a station has, twice. */
export async function workersMemoryMib({ id }: StationRow): Promise<number> {
  const worker = spawn(process.execPath, [...WORKER_ARGUMENTS, 'ingest/worker.ts'], { stdio: 'ignore' });
  try {
    for (let round = 0; round < 2; round += 1) {
      await inTransaction((transaction) => markMeasuredQuarters(id, transaction));
      await untilNothingWaits();
    }
    return residentMib(worker.pid ?? NaN).highest;
  } finally {
    worker.kill('SIGTERM');
    await once(worker, 'exit');
  }
}

/** Highest resident memory, in MiB, of a process that answers the questions of a month and a year again and again. */
export async function asksMemoryMib(): Promise<number> {
  const asking = spawn(process.execPath, [...WEB_ARGUMENTS, 'ops/bench/support/ask.ts'], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  let printed = '';
  asking.stdout.on('data', (text: Buffer) => (printed += text.toString()));
  await once(asking, 'exit');
  return Number(printed);
}

/** Waits until no mark is left. @throws after a minute. */
export async function untilNothingWaits(): Promise<void> {
  const deadlineMs = Date.now() + 60_000;
  while (Date.now() < deadlineMs) {
    if (!(await db()('dirty_marks').first('id'))) return;
    await sleep(200);
  }
  throw new Error('The worker has not recomputed everything within a minute.');
}

/** Resident memory of a process in MiB, now and at its highest. */
export function residentMib(processId: number): { now: number; highest: number } {
  const status = readFileSync(`/proc/${processId}/status`, 'utf8');
  const [now = NaN, highest = NaN] = ['VmRSS', 'VmHWM'].map(
    (name) => Number(new RegExp(`^${name}:\\s+(\\d+) kB$`, 'm').exec(status)?.[1]) / 1024,
  );
  return { now, highest };
}
