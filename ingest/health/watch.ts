import { listOpenTroubles } from '#db/queries/health';
import { listHealthSettings } from '#db/queries/healthSettings';
import { listNetworks, type NetworkRow } from '#db/queries/networks';
import { listClocks } from '#db/queries/stationClocks';
import { listLatest } from '#db/queries/stationLatest';
import { listStations, type StationRow } from '#db/queries/stations';
import { judgeStation } from '#lib/services/health/judge';
import { readEvidence } from '#lib/services/health/readEvidence';
import { thresholdsFor } from '#lib/services/health/thresholds';
import { eachAlone, networkSubject } from '../jobs/alone';
import { endTroubleOf, follow, watchOf } from './follow';

/**
 * Judges every station in use and keeps what is wrong: one message a trouble when it begins and one when it is over. Safe to run
 * twice and on two machines: a station has at most one open trouble of a kind.
 * @returns how many began or were over.
 */
export async function watchStations(now: Date): Promise<number> {
  const watch = (network: NetworkRow) => watchNetwork(network, now);
  return eachAlone('watch-health', await listNetworks(), networkSubject, watch, now);
}

async function watchNetwork(network: NetworkRow, now: Date): Promise<number> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const [stations, latest, clocks, rows, open] = await Promise.all([
    listStations(network.id),
    listLatest(network.id),
    listClocks(network.id),
    listHealthSettings(network.id),
    listOpenTroubles(network.id),
  ]);
  const watch = await watchOf(network, rows, nowSec);
  const judge = async (station: StationRow) => {
    const ofStation = open.filter(({ stationId }) => stationId === station.id);
    if (station.retiredAt) {
      for (const trouble of ofStation) await endTroubleOf(trouble, nowSec);
      return 0;
    }
    const known = {
      station,
      latest: latest.find(({ stationId }) => stationId === station.id),
      clock: clocks.find(({ stationId }) => stationId === station.id),
      thresholds: thresholdsFor(station.id, rows),
      nowSec,
    };
    let changes = 0;
    const openSince = new Map(ofStation.map(({ kind, beginsAtSec }) => [kind, beginsAtSec]));
    const findings = judgeStation(await readEvidence(known), openSince);
    for (const [kind, finding] of findings) {
      const trouble = ofStation.find((one) => one.kind === kind);
      if (await follow(watch, station, kind, finding, trouble)) changes += 1;
    }
    return changes;
  };
  const subjectOf = ({ id }: StationRow) => ({ name: `station ${id}`, networkId: network.id });
  return eachAlone('watch-health', stations, subjectOf, judge, now);
}
