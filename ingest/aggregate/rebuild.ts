import { inTransaction } from '#db/queries/connection';
import { deleteDayPeriods } from '#db/queries/dayPeriods';
import { deleteDayTraces } from '#db/queries/dayTraces';
import { deleteQuarterHours, markMeasuredQuarters } from '#db/queries/quarterHours';
import { listStationIds, lockStation } from '#db/queries/stations';
import { aggregateAll, type OnQuartersRecomputed } from './aggregate';

/**
 * Drops everything that is computed from intervals and computes it again. In between answers stay right, because every
 * quarter-hour that has intervals is marked in the transaction that drops its row.
 */
export async function rebuildAll(onQuartersRecomputed: OnQuartersRecomputed): Promise<number> {
  for (const stationId of await listStationIds()) {
    await inTransaction(async (transaction) => {
      await lockStation(stationId, transaction);
      await deleteQuarterHours(stationId, transaction);
      await deleteDayPeriods(stationId, transaction);
      await deleteDayTraces(stationId, transaction);
      await markMeasuredQuarters(stationId, transaction);
    });
  }
  return aggregateAll(onQuartersRecomputed);
}
