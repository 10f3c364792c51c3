import type { Connection } from '#db/queries/connection';
import { selectStandingOfLimit } from '#db/queries/judgedExceedances';
import { findLimit } from '#db/queries/limits';
import { listSettings } from '#db/queries/networks';
import { insertPendingWindows, type NewPendingWindow } from '#db/queries/pendingWindows';
import { selectQuarterStarts } from '#db/queries/quarterHours';
import { listStations, lockStation } from '#db/queries/stations';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { enoughToJudge, judgedWindows, LONGEST_WINDOW_SEC } from './force';

/**
 * Has the windows of a limit judged that begin from an instant (epoch seconds) on and have data already, and those in which it
 * found something before: after it was set or changed. Later data bring their own windows. Call it in the read-committed
 * transaction of the change: holding each station, it sees what was computed, and what is computed next sees the change.
 */
export async function pendLimit(
  networkId: number,
  limitId: number,
  fromSec: number,
  transaction: Connection,
): Promise<void> {
  const nowSec = Math.floor(Date.now() / 1000);
  if (fromSec >= nowSec) return;
  const ofLimit = await findLimit(networkId, limitId, transaction);
  const timeline = await listSettings(networkId, transaction);
  const pending = new Map<string, NewPendingWindow>();
  const add = (window: NewPendingWindow) =>
    pending.set(`${window.stationId}:${window.startSec}:${window.endSec}`, window);
  const stations = await listStations(networkId, transaction);
  for (const { id: stationId } of stations.sort((a, b) => a.id - b.id)) {
    await lockStation(stationId, transaction);
    const quarters = await selectQuarterStarts(stationId, fromSec, nowSec + LONGEST_WINDOW_SEC, transaction);
    const measured = new Set(quarters);
    const windows = judgedWindows(ofLimit, stationId, { fromSec, toSec: nowSec }, timeline).filter(
      ({ startSec, endSec }) => holdsAny(measured, startSec, endSec),
    );
    for (const { startSec, endSec } of enoughToJudge(windows, nowSec, timeline))
      add({ limitId, stationId, startSec, endSec });
  }
  (await selectStandingOfLimit(limitId, fromSec, transaction)).forEach(add);
  await insertPendingWindows([...pending.values()], transaction);
}

function holdsAny(quarters: ReadonlySet<number>, startSec: number, endSec: number): boolean {
  for (let quarter = quarterAt(startSec); quarter < endSec; quarter += QUARTER_SEC) {
    if (quarters.has(quarter)) return true;
  }
  return false;
}
