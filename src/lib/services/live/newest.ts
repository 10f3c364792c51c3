import { listLatestOfNetworks, type StationLatest } from '#db/queries/stationLatest';
import { type LiveInterval } from '#lib/contracts/live';
import { stationState } from '../stations/state';
import { latestView } from '../stations/view';

/** The newest intervals of some networks' stations, by network. */
export async function newestOf(networkIds: readonly number[]): Promise<Map<number, LiveInterval[]>> {
  const rows = await listLatestOfNetworks(networkIds);
  const nowSec = Math.floor(Date.now() / 1000);
  const byNetwork = new Map<number, LiveInterval[]>(networkIds.map((id) => [id, []]));
  for (const row of rows) byNetwork.get(row.networkId)?.push(liveInterval(row, nowSec));
  return byNetwork;
}

function liveInterval(row: StationLatest, nowSec: number): LiveInterval {
  return { code: row.code, state: stationState(row, row, nowSec), ...latestView(row) };
}
