import { listOpenTroubles } from '#db/queries/health';
import { listHealthSettings } from '#db/queries/healthSettings';
import { listNetworks, type NetworkRow } from '#db/queries/networks';
import type { Drift, DriftVerdictJson } from '#lib/contracts/drift';
import { driftSource, stationDrift } from '#lib/services/drift/stationDrift';
import { FINE, UNKNOWN, type Finding } from '#lib/services/health/evidence';
import { eachAlone, networkSubject } from '../jobs/alone';
import { follow, watchOf } from './follow';

/**
 * Judges the nightly background and the self-checks of every station in use, and tells of drift as of any other trouble; nothing is
 * corrected by it. Safe to run twice and on two machines. @returns how many began or were over.
 */
export async function watchDrift(now: Date): Promise<number> {
  const watch = (network: NetworkRow) => watchNetwork(network, now);
  return eachAlone('watch-drifts', await listNetworks(), networkSubject, watch, now);
}

async function watchNetwork(network: NetworkRow, now: Date): Promise<number> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const [source, settings, open] = await Promise.all([
    driftSource(network.id, nowSec),
    listHealthSettings(network.id),
    listOpenTroubles(network.id),
  ]);
  const watch = await watchOf(network, settings, nowSec);
  const judge = async (station: (typeof source.stations)[number]) => {
    let changes = 0;
    const drift = await stationDrift(station, source);
    for (const [kind, finding] of findingsOf(drift, nowSec)) {
      const trouble = open.find((one) => one.stationId === station.id && one.kind === kind);
      if (await follow(watch, station, kind, finding, trouble)) changes += 1;
    }
    return changes;
  };
  const subjectOf = ({ id }: { id: number }) => ({ name: `station ${id}`, networkId: network.id });
  return eachAlone('watch-drifts', source.stations, subjectOf, judge, now);
}

function findingsOf({ background, selfCheck }: Drift, nowSec: number) {
  return [
    ['drift', findingOf(background, nowSec)],
    ['selfcheck', findingOf(selfCheck, nowSec)],
  ] as const;
}

function findingOf({ state, change, bound }: DriftVerdictJson, nowSec: number): Finding {
  if (state === 'drifting') return { state: 'bad', sinceSec: nowSec, measured: change, bound };
  return state === 'fine' ? FINE : UNKNOWN;
}
