import { DateTime } from 'luxon';
import { inTransaction } from '#db/queries/connection';
import { markUncomputedPeriod } from '#db/queries/dayPeriods';
import { listNetworks, listSettings, pickSettings, type NetworkRow } from '#db/queries/networks';
import {
  deleteIntervalsBefore,
  findSeal,
  hasWorkBefore,
  keepMonthsOf,
  listSealedBefore,
  oldestIntervalSec,
  sealStation,
} from '#db/queries/retention';
import { listStations, lockStation } from '#db/queries/stations';
import { periodsTouching } from '#lib/services/levels/datePeriods';
import { forgetKept } from '#lib/services/retention/kept';
import { eachAlone, networkSubject } from '../jobs/alone';
import { eachStation } from '../jobs/stationsAlone';
import { dropPassedMonths } from './dropMonths';

const JOB = 'retain-intervals';
const DAY_SEC = 86_400;
/** What is recomputed after the seal may need intervals so long before it: a night, a day's trace, a rolling window. */
const MARGIN_SEC = 2 * DAY_SEC;
/** From sealing to deleting: every process reads sums instead by then. */
const PAUSE_MS = 15 * 60_000;
const ROWS_A_TRANSACTION = 5000;

/**
 * Where a network does not keep single intervals for good: seals whole months that are older, once everything of them is computed,
 * and deletes their intervals a while later: partitions that nobody keeps anything of as they are, else a bounded number of rows at a time. Safe to run twice, late, or on two machines.
 * @returns how many rows were deleted.
 */
export async function retainIntervals(now: Date): Promise<number> {
  await eachAlone(JOB, await listNetworks(), networkSubject, (network) => sealNetwork(network, now), now);
  const sealedBy = new Date(now.getTime() - PAUSE_MS);
  // Where it cannot, rows are deleted one by one all the same.
  await eachAlone(JOB, [sealedBy], () => ({ name: 'whole months', networkId: null }), dropPassedMonths, now);
  const sealed = await listSealedBefore(sealedBy);
  const keptFrom = new Map(sealed.map(({ stationId, keptFromSec }) => [stationId, keptFromSec]));
  const remove = (stationId: number) =>
    deleteIntervalsBefore(stationId, keptFrom.get(stationId) ?? 0, ROWS_A_TRANSACTION);
  return eachStation(JOB, keptFrom.keys(), remove, now);
}

/** Seals what is due of each station that has anything before it. @returns how many stations. */
async function sealNetwork(network: NetworkRow, now: Date): Promise<number> {
  const keepMonths = await keepMonthsOf(network.id);
  if (keepMonths === null) return 0;
  const timeline = await listSettings(network.id);
  const { timeZone } = pickSettings(timeline, now.getTime() / 1000);
  const horizon = DateTime.fromJSDate(now, { zone: timeZone }).minus({ months: keepMonths }).startOf('month');
  const sealedBeforeSec = horizon.toUnixInteger();
  const due = await dueStations(network.id, sealedBeforeSec);
  if (due.length === 0) return 0;
  const oldestSec = Math.min(...due.map((station) => station.oldestSec));
  for (const period of periodsTouching(oldestSec, sealedBeforeSec, timeline)) {
    await markUncomputedPeriod(network.id, period);
  }
  const ids = due.map(({ id }) => id);
  return eachStation(JOB, ids, (stationId) => sealOne(stationId, sealedBeforeSec, now), now);
}

/** Stations that have unsealed intervals before an instant. */
async function dueStations(networkId: number, sealedBeforeSec: number) {
  const due: { id: number; oldestSec: number }[] = [];
  for (const { id } of await listStations(networkId)) {
    const { sealedBeforeSec: sealedSec, keptFromSec } = await findSeal(id);
    const oldestSec = sealedSec >= sealedBeforeSec ? null : await oldestIntervalSec(id);
    if (oldestSec !== null && oldestSec < sealedBeforeSec) {
      due.push({ id, oldestSec: Math.max(oldestSec, keptFromSec) });
    }
  }
  return due;
}

/** @returns 1, or 0 where something before it has still to be computed, judged, stored or moved. */
function sealOne(id: number, sealedBeforeSec: number, now: Date): Promise<number> {
  return inTransaction(
    async (transaction) => {
      await lockStation(id, transaction);
      if (await hasWorkBefore(id, sealedBeforeSec, transaction)) return 0;
      const seal = { sealedBeforeSec, keptFromSec: sealedBeforeSec - MARGIN_SEC };
      await sealStation(id, seal, now, transaction);
      forgetKept();
      return 1;
    },
    { isolationLevel: 'read committed' },
  );
}
