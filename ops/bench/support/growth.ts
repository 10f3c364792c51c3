import { fork, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { WEB_ARGUMENTS } from '#ops/start/webArguments';
import { median } from './measure';

/** What a table holds of stations like the one that is asked about. */
export interface Size {
  months: number;
  stations: number;
}

const WARM_ROUNDS = 40;
const ROUNDS = 101;

/**
 * What the statistics of a month cost in tables of several sizes, in milliseconds: medians, each size in a database and a process of its
 * own, asked turn by turn, so that what else the machine does meets all alike.
 */
export async function monthBySize(sizes: readonly Size[]): Promise<number[]> {
  const asked: { child: ChildProcess; ms: number[] }[] = [];
  for (const { months, stations } of sizes) {
    const child = fork('ops/bench/support/growing.ts', [String(months), String(stations)], {
      execArgv: WEB_ARGUMENTS,
    });
    await once(child, 'message');
    asked.push({ child, ms: [] });
  }
  for (let round = -WARM_ROUNDS; round < ROUNDS; round += 1) {
    // Back and forth: a turn after one neighbour is not like a turn after the other.
    for (const { child, ms } of round % 2 === 0 ? asked : asked.toReversed()) {
      child.send('ask');
      const [tookMs] = (await once(child, 'message')) as [number];
      if (round >= 0) ms.push(tookMs);
    }
  }
  for (const { child } of asked) {
    child.disconnect();
    await once(child, 'exit');
  }
  return asked.map(({ ms }) => median(ms));
}
