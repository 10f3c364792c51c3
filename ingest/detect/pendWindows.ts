import type { Connection } from '#db/queries/connection';
import { listLimitVersions } from '#db/queries/limits';
import { listSettings } from '#db/queries/networks';
import { insertPendingWindows, type NewPendingWindow } from '#db/queries/pendingWindows';
import { findStationById } from '#db/queries/stations';
import { QUARTER_SEC } from '#lib/time/quarters';
import { windowsOf } from '#lib/services/limits/windows';

/** Longest window: a night of a clock change, with room. */
const LONGEST_WINDOW_SEC = 26 * 3600;

/**
 * Has every window judged, once it has closed, that holds one of these quarter-hours of a station: of every limit in force
 * there. Belongs in the transaction that rewrote the quarter-hours.
 */
export async function pendWindowsFor(
  stationId: number,
  quarterStartsSec: readonly number[],
  transaction: Connection,
): Promise<void> {
  const station = await findStationById(stationId, transaction);
  if (!station || quarterStartsSec.length === 0) return;
  const versions = await listLimitVersions(station.networkId, transaction);
  const covering = versions.filter(({ stationIds }) => stationIds === null || stationIds.includes(stationId));
  if (covering.length === 0) return;
  const timeline = await listSettings(station.networkId, transaction);
  const pending = new Map<string, NewPendingWindow>();
  for (const run of runsOf(quarterStartsSec)) {
    for (const version of covering) {
      for (const window of windowsOf(version, run.fromSec - LONGEST_WINDOW_SEC, run.toSec, timeline)) {
        if (window.endSec <= run.fromSec || window.startSec >= run.toSec) continue;
        pending.set(`${version.limitId}:${window.startSec}`, {
          limitId: version.limitId,
          stationId,
          ...window,
        });
      }
    }
  }
  await insertPendingWindows([...pending.values()], transaction);
}

/** Runs of quarter-hours that follow one another. */
function runsOf(quarterStartsSec: readonly number[]): { fromSec: number; toSec: number }[] {
  const runs: { fromSec: number; toSec: number }[] = [];
  for (const startSec of [...new Set(quarterStartsSec)].sort((a, b) => a - b)) {
    const last = runs.at(-1);
    if (last?.toSec === startSec) last.toSec += QUARTER_SEC;
    else runs.push({ fromSec: startSec, toSec: startSec + QUARTER_SEC });
  }
  return runs;
}
