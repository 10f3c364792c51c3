import { inTransaction } from '#db/queries/connection';
import { deleteDayPeriods } from '#db/queries/dayPeriods';
import { dropTracesFrom } from '#db/queries/dayTraces';
import { deleteQuarterHours, markMeasuredQuarters } from '#db/queries/quarterHours';
import { findSeal } from '#db/queries/retention';
import { listStationIds, lockStation } from '#db/queries/stations';

/**
 * Drops everything that is computed from intervals, but what is sealed, and has the worker compute it again; answers how many stations
 * that was. In between answers stay right, because every quarter-hour that has intervals is marked in the transaction that drops its row.
 */
export async function dropComputed(): Promise<number> {
  const stationIds = await listStationIds();
  for (const stationId of stationIds) {
    await inTransaction(async (transaction) => {
      await lockStation(stationId, transaction);
      const { sealedBeforeSec } = await findSeal(stationId, transaction);
      await deleteQuarterHours(stationId, sealedBeforeSec, transaction);
      await deleteDayPeriods(stationId, sealedBeforeSec, transaction);
      await dropTracesFrom(stationId, sealedBeforeSec, transaction);
      await markMeasuredQuarters(stationId, transaction);
    });
  }
  return stationIds.length;
}
