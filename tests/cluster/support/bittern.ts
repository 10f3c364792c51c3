import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { config } from '#lib/config/index';
import { makeNetwork, makeStation } from '#ops/bench/support/station';
import { stopProcess } from '#ops/cluster/processes';
import { startPrograms } from '#ops/cluster/programs';
import { testCluster } from './cluster';

/** A web that takes posts and has no pages, which need no build. */
export const RECEIVER = 'ops/bench/support/soak/receiver.ts';

/** Starts what does not run of two webs and two workers on the test's database. */
export async function startBittern(webScript?: string): Promise<void> {
  const settings = {
    BITTERN_DB_NAME: config().database.name,
    BITTERN_PERSONAL_DATA_KEY: process.env['BITTERN_PERSONAL_DATA_KEY'] ?? '',
    BITTERN_LOG_LEVEL: 'warn',
  };
  await startPrograms(testCluster(), settings, webScript);
}

export async function stopBittern(): Promise<void> {
  for (const name of ['web1', 'web2', 'worker1', 'worker2']) await stopProcess(testCluster(), name);
}

/** Makes a network of stations that may post. @returns their ids by token. */
export async function makePostingStations(prefix: string, count: number): Promise<Map<string, number>> {
  const networkId = await makeNetwork();
  const stationIds = new Map<string, number>();
  for (let at = 0; at < count; at += 1) {
    const { id } = await makeStation(networkId, `${prefix}-${at}`, 60);
    stationIds.set(await inTransaction((transaction) => insertStationToken(id, null, transaction)), id);
  }
  return stationIds;
}
