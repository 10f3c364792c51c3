import { pool } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { pendWindowsFor } from '#ingest/detect/pendWindows';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { digits, median, msOf } from './measure';
import { fill, makeNetwork, makeStation } from './station';

/** Hours of the running day that have data: about the mean over days, evenings and nights. */
const ELAPSED_SEC = 5 * 3600;
const ROUNDS = 5;

/**
 * The worker's share of a core when 200 stations of a minute and 20 of a second each post once a minute, five hours into their
 * day: measured on ten and two of them. By processor time of this process, as if it were on the clock beside it.
 */
export async function fleetRow(): Promise<string[]> {
  const nowSec = Math.floor(Date.now() / 1000);
  const networkId = await makeNetwork('fleet', zoneWhereItIsNoon(nowSec));
  const minutes = await runningStations(networkId, nowSec, 60, 10);
  const seconds = await runningStations(networkId, nowSec, 1, 2);
  const minute = await roundsOf(minutes, nowSec);
  const second = await roundsOf(seconds, nowSec);
  const percent = (of: 'cpuMs' | 'ms') => digits(((20 * minute[of] + 10 * second[of]) / 60_000) * 100);
  return [
    `keeping up with 200 stations of a minute and 20 of a second: % of a core (a station: ${digits(minute.cpuMs / 10)} ms, ` +
      `${digits(second.cpuMs / 2)} ms; by the clock ${percent('ms')} %)`,
    percent('cpuMs'),
    '≤ 5',
  ];
}

/** A zone of whole hours in which it is between 12 and 13 o'clock. */
function zoneWhereItIsNoon(nowSec: number): string {
  const hoursBehind = new Date(nowSec * 1000).getUTCHours() - 12;
  return `Etc/GMT${hoursBehind >= 0 ? '+' : ''}${hoursBehind}`;
}

async function runningStations(
  networkId: number,
  nowSec: number,
  intervalSec: number,
  count: number,
): Promise<StationRow[]> {
  const stations: StationRow[] = [];
  const fromSec = quarterAt(nowSec - ELAPSED_SEC);
  for (let at = 0; at < count; at += 1) {
    const station = await makeStation(networkId, `RUNNING-${intervalSec}-${at}`, intervalSec);
    await fill(station.id, fromSec, Math.floor((nowSec - fromSec) / intervalSec), intervalSec);
    stations.push(station);
  }
  return stations;
}

/** Marks the running quarter of some stations, as their posts do, and recomputes it; medians over rounds. */
async function roundsOf(
  stations: readonly StationRow[],
  nowSec: number,
): Promise<{ cpuMs: number; ms: number }> {
  const cpuMs: number[] = [];
  const ms: number[] = [];
  for (let round = -1; round < ROUNDS; round += 1) {
    // The quarter before, so that it is a whole one whenever this runs: the dearest moment.
    for (const { id } of stations) await insertDirtyMarks(id, [quarterAt(nowSec) - QUARTER_SEC], pool());
    const before = process.cpuUsage();
    const tookMs = await msOf(() => aggregateAll(pendWindowsFor));
    const { user, system } = process.cpuUsage(before);
    if (round < 0) continue;
    ms.push(tookMs);
    cpuMs.push((user + system) / 1000);
  }
  return { cpuMs: median(cpuMs), ms: median(ms) };
}
