import { inTransaction } from '#db/queries/connection';
import { hasIntervalsKept, hasSealed, lockKeepers } from '#db/queries/retentionMonths';
import { dropPartitions, listParted, onPartedServers } from '#db/partitions/parted';
import { log } from '#lib/config/log';

/**
 * Drops whole partitions of intervals that no station keeps any more, which costs next to nothing where deleting rows takes hours. A station
 * that still keeps any interval of a partition prevents it; then the others' rows are deleted one by one. Stations that may store
 * something there meanwhile are locked, so nothing that was stored goes with the rest.
 * @param sealedBy only seals made by then count: every process knows of them.
 * @returns how many partitions were dropped.
 */
export async function dropPassedMonths(sealedBy: Date): Promise<number> {
  if (!(await hasSealed(sealedBy, 0))) return 0;
  const passedSec = await latestPassed(sealedBy);
  if (passedSec === null) return 0;
  return inTransaction(async (transaction) => {
    await lockKeepers(passedSec, sealedBy, transaction);
    if (await hasIntervalsKept(passedSec, sealedBy)) return 0;
    let dropped = 0;
    await onPartedServers(async (connection) => {
      for (const parted of await listParted(connection)) {
        if (parted.kind !== 'interval_levels') continue;
        const passed = parted.partitions.filter(({ endSec }) => endSec !== null && endSec <= passedSec);
        await dropPartitions(connection, parted, passed);
        dropped += passed.length;
      }
    });
    log().info({ dropped, before: passedSec }, 'months of intervals dropped');
    return dropped;
  });
}

/** The latest end of a partition before which no interval is kept; null where there is none. */
async function latestPassed(sealedBy: Date): Promise<number | null> {
  const ends = new Set<number>();
  await onPartedServers(async (connection) => {
    for (const { kind, partitions } of await listParted(connection))
      if (kind === 'interval_levels')
        for (const { endSec } of partitions) if (endSec !== null) ends.add(endSec);
  });
  let latest: number | null = null;
  for (const endSec of [...ends].sort((a, b) => a - b)) {
    // An empty partition of a time that nobody has sealed stays.
    if (!(await hasSealed(sealedBy, endSec)) || (await hasIntervalsKept(endSec, sealedBy))) break;
    latest = endSec;
  }
  return latest;
}
