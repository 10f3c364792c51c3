import { setMaxListeners } from 'node:events';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { loadavg, tmpdir } from 'node:os';
import { join } from 'node:path';
import { runScript } from './support/soak/runScript';
import { compareDatabases, type TableResult } from './support/soak/compare';
import { untilDrained } from './support/soak/database';
import { Instance, webScript } from './support/soak/instance';
import { killAtRandom } from './support/soak/kills';
import { Answers, runSoakMonitor } from './support/soak/monitor';
import { readOptions } from './support/soak/options';
import { givenBy } from './support/soak/records';
import { printTable } from './support/measure';

/**
 * Many monitors post, late, twice, out of order and corrupt, while web, worker and database are killed at random; then the same
 * posts without disturbance. Every table that follows from them must be the same, row for row. See the README here.
 */
const options = readOptions(process.argv.slice(2));
process.env['PATH'] = `${process.env['PATH']}:/usr/sbin`;
const QUARTER_SEC = 900;
const DRAIN_TIMEOUT_MS = 1_200_000;
/** Monitors that post at once in the undisturbed run, which waits for no clock. */
const CALM_AT_ONCE = 12;

const dataMinutes = Math.max(30, Math.round(options.minutes * options.speed));
const firstSec = firstSecond();
const stop = new AbortController();
// Every monitor that waits listens to it.
setMaxListeners(0, stop.signal);
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => stop.abort());
// Nobody reads any more: end in order all the same.
process.stdout.on('error', () => stop.abort());

const directory = mkdtempSync(join(tmpdir(), 'bittern-soak-'));
let instance: Instance | undefined;
try {
  process.exitCode = (await soak()) ? 0 : 1;
} catch (error) {
  console.error(stop.signal.aborted ? 'Stopped before it was done.' : error);
  process.exitCode = 1;
} finally {
  await instance?.stop();
  if (options.keep) console.log(`Kept: ${directory}`);
  else rmSync(directory, { recursive: true, force: true });
}

async function soak(): Promise<boolean> {
  const { stations, minutes, seed } = options;
  console.log(
    `${stations} stations, ${dataMinutes} minutes of data from ${new Date(firstSec * 1000).toISOString()}, ` +
      `posted over ${minutes} minutes, seed ${seed}; web: ${webScript()}; load ${loadavg()[0]?.toFixed(1)}`,
  );
  instance = await Instance.start(directory, options.paired);
  const disturbed = await disturbedRun(instance);
  const calm = await calmRun(instance);
  stop.signal.throwIfAborted();
  const results = await compareDatabases(instance, 'soak_disturbed', 'soak_calm');
  printResults(results);
  const odd = [...disturbed.odd, ...calm.odd];
  for (const what of odd) console.log(`An answer that no monitor should get: ${what}`);
  const isSame = results.every(({ onlyHere, onlyThere }) => onlyHere.length + onlyThere.length === 0);
  console.log(isSame ? 'The tables are equal.' : 'The tables DIFFER.');
  if (instance.ownEnds > 0)
    console.log('A process ended though nobody had killed it: its log says why (--keep).');
  return isSame && odd.length === 0 && instance.ownEnds === 0;
}

async function disturbedRun(on: Instance): Promise<Answers> {
  const tokens = await prepare(on, 'soak_disturbed');
  await on.startBittern('soak_disturbed');
  const startMs = Date.now();
  const msOfMinute = (options.minutes * 60_000) / dataMinutes;
  const killing = new AbortController();
  const kills = killAtRandom(
    on,
    { seed: options.seed, longestGapSec: options.killsWithin, forMinutes: options.minutes },
    AbortSignal.any([killing.signal, stop.signal]),
  );
  const answers = new Answers();
  try {
    await Promise.all([
      bringFiles(on, 'soak_disturbed'),
      ...tokens.map((token, station) => {
        const phaseMs = (station / tokens.length) * msOfMinute;
        const dueInMs = (minute: number) => startMs + phaseMs + minute * msOfMinute - Date.now();
        return runSoakMonitor(placeOf(on, token, station, answers, dueInMs), stop.signal);
      }),
    ]);
  } finally {
    killing.abort();
    console.log(`Killed: ${wordsOf(Object.entries(await kills))}; ended by themselves: ${on.ownEnds}`);
  }
  await settle(on, 'soak_disturbed', startMs, answers);
  return answers;
}

async function calmRun(on: Instance): Promise<Answers> {
  stop.signal.throwIfAborted();
  const answers = new Answers();
  const tokens = await prepare(on, 'soak_calm');
  await on.startBittern('soak_calm');
  const startMs = Date.now();
  const waiting = tokens.map((token, station) => ({ token, station }));
  const sendWaiting = async () => {
    for (let one = waiting.shift(); one && !stop.signal.aborted; one = waiting.shift()) {
      await runSoakMonitor(
        placeOf(on, one.token, one.station, answers, () => 0),
        stop.signal,
      );
    }
  };
  await Promise.all([bringFiles(on, 'soak_calm'), ...Array.from({ length: CALM_AT_ONCE }, sendWaiting)]);
  await settle(on, 'soak_calm', startMs, answers);
  return answers;
}

function placeOf(
  on: Instance,
  token: string,
  station: number,
  answers: Answers,
  dueInMs: (minute: number) => number,
) {
  const given = givenBy(options.seed, station, firstSec, dataMinutes);
  const address = `10.0.${Math.floor(station / 250)}.${(station % 250) + 1}`;
  const origin = on.origins[station % on.origins.length] ?? '';
  return { origin, token, address, given, answers, dueInMs };
}

/** Makes a database with its stations. @returns their tokens. */
async function prepare(on: Instance, databaseName: string): Promise<string[]> {
  const tokensPath = join(directory, `${databaseName}.json`);
  const given = [String(options.stations), String(firstSec), tokensPath];
  await runScript('ops/bench/support/soak/prepare.ts', given, on.environment(databaseName), stop.signal);
  return JSON.parse(readFileSync(tokensPath, 'utf8')) as string[];
}

/** Files of the month before, brought, undone and redone while monitors post. */
function bringFiles(on: Instance, databaseName: string): Promise<void> {
  const given = [String(firstSec - (options.cardRows + 60) * 60), String(options.cardRows)];
  return runScript('ops/bench/support/soak/bring.ts', given, on.environment(databaseName), stop.signal);
}

/** Waits until the worker has nothing left, then stops web and worker. */
async function settle(on: Instance, databaseName: string, startMs: number, answers: Answers): Promise<void> {
  const sentMs = Date.now();
  await untilDrained(on, databaseName, DRAIN_TIMEOUT_MS, stop.signal);
  await on.stopBittern();
  const seconds = (ms: number) => `${(ms / 1000).toFixed(0)} s`;
  console.log(
    `${databaseName}: sent in ${seconds(sentMs - startMs)}, computed ${seconds(Date.now() - sentMs)} later; ` +
      `answers: ${wordsOf([...answers.counts])}; load ${loadavg()[0]?.toFixed(1)}`,
  );
}

function printResults(results: readonly TableResult[]): void {
  printTable(
    ['table', 'rows', 'only in the disturbed', 'only in the undisturbed'],
    results.map(({ table, rows, onlyHere, onlyThere }) => [
      table,
      String(rows),
      String(onlyHere.length),
      String(onlyThere.length),
    ]),
  );
  for (const { table, onlyHere, onlyThere } of results) {
    for (const row of onlyHere) console.log(`${table}, only in the disturbed: ${JSON.stringify(row)}`);
    for (const row of onlyThere) console.log(`${table}, only in the undisturbed: ${JSON.stringify(row)}`);
  }
}

function wordsOf(counts: readonly (readonly [string, number])[]): string {
  return counts.map(([what, count]) => `${what} ${count}`).join(', ') || 'none';
}

/** Wholly past, so that nothing depends on the time of the run, and about the beginning of a day of the network. */
function firstSecond(): number {
  const dayMs = 86_400_000;
  const sevenSec = (Math.floor(Date.now() / dayMs) - 30) * 86_400 + 7 * 3600;
  return Math.floor((sevenSec - (dataMinutes * 60) / 2) / QUARTER_SEC) * QUARTER_SEC;
}
