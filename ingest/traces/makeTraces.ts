import { inTransaction } from '#db/queries/connection';
import { deleteDayTraces, listWaitingDays, storeDayTrace } from '#db/queries/dayTraces';
import { listSettings } from '#db/queries/networks';
import type { Buckets } from '#db/queries/onlyBuckets';
import { findStationById, lockStation } from '#db/queries/stations';
import { packShapes } from '#lib/acoustics/dayTrace';
import { groupBy } from '#lib/services/groupBy';
import { makeTrace } from '#lib/services/spectra/makeTrace';
import { eachStation, restingStationIds } from '../jobs/stationsAlone';

const JOB = 'trace-days';
/** Days made in one round. */
const MOST_DAYS = 40;
/** A day that ended this recently is still being filled by monitors that were late: it is made when it is asked for. */
const REST_SEC = 1800;

/**
 * Makes traces of ended days that wait, latest first, at most `mostDays`, of stations of some buckets. Each is made with its station locked, from everything that
 * was committed before; what changes afterwards marks quarter-hours, whose recomputation has the day wait again.
 * @returns how many days.
 */
export async function makeTraces(
  now: Date,
  { mostDays = MOST_DAYS, buckets = null }: { mostDays?: number; buckets?: Buckets } = {},
): Promise<number> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const days = await listWaitingDays(nowSec - REST_SEC, mostDays, {
    exceptStationIds: await restingStationIds(JOB, now),
    buckets,
  });
  const byStation = groupBy(days, ({ stationId }) => stationId);
  const makeDays = async (stationId: number) => {
    const ofStation = byStation.get(stationId) ?? [];
    for (const { dayStartSec } of ofStation) await makeDay(stationId, dayStartSec);
    return ofStation.length;
  };
  return eachStation(JOB, byStation.keys(), makeDays, now);
}

async function makeDay(stationId: number, dayStartSec: number): Promise<void> {
  await inTransaction(
    async (transaction) => {
      const station = await findStationById(stationId, transaction);
      if (!station) return deleteDayTraces(stationId, transaction);
      await lockStation(stationId, transaction);
      const timeline = await listSettings(station.networkId, transaction);
      const trace = await makeTrace(station, timeline, dayStartSec, transaction);
      const packed = trace && {
        outline: Buffer.from(trace.outline),
        shapes: Buffer.from(packShapes(trace)),
      };
      await storeDayTrace(stationId, dayStartSec, packed, transaction);
    },
    { isolationLevel: 'read committed' },
  );
}
