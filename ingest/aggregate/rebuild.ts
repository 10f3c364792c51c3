import { inTransaction } from '#db/queries/connection';
import { deleteDayPeriods } from '#db/queries/dayPeriods';
import { dropTracesFrom } from '#db/queries/dayTraces';
import { deleteQuarterHours, markMeasuredQuarters } from '#db/queries/quarterHours';
import { findSeal } from '#db/queries/retention';
import { listStationIds, lockStation } from '#db/queries/stations';
import { aggregateAll, type OnQuartersRecomputed } from './aggregate';

/**
 * Drops everything that is computed from intervals, but what is sealed, and computes it again. In between answers stay right, because every
 * quarter-hour that has intervals is marked in the transaction that drops its row.
 */
export async function rebuildAll(onQuartersRecomputed: OnQuartersRecomputed): Promise<number> {
  for (const stationId of await listStationIds()) {
    await inTransaction(async (transaction) => {
      await lockStation(stationId, transaction);
      const { sealedBeforeSec } = await findSeal(stationId, transaction);
      await deleteQuarterHours(stationId, sealedBeforeSec, transaction);
      await deleteDayPeriods(stationId, sealedBeforeSec, transaction);
      await dropTracesFrom(stationId, sealedBeforeSec, transaction);
      await markMeasuredQuarters(stationId, transaction);
    });
  }
  return aggregateAll(onQuartersRecomputed);
}
