import type { Connection } from '#db/queries/connection';
import { LONGEST_EXCEEDANCE_SEC, selectStandingWindows } from '#db/queries/judgedExceedances';
import { listLimitVersions, type LimitVersion } from '#db/queries/limits';
import { listSettings, type NetworkSettings } from '#db/queries/networks';
import { insertPendingWindows, selectOpenWindows, type NewPendingWindow } from '#db/queries/pendingWindows';
import { findStationById } from '#db/queries/stations';
import type { Span } from '#lib/services/levels/spans';
import {
  BACKGROUND_REACH_SEC,
  backgroundHoursOf,
  hasBackgroundHours,
} from '#lib/services/limits/backgroundHours';
import {
  byLimit,
  enoughToJudge,
  judgedWindows,
  LONGEST_WINDOW_SEC,
  type JudgedWindow,
} from '#lib/services/limits/force';
import { QUARTER_SEC } from '#lib/time/quarters';

/**
 * Has every window judged, once it has closed, that holds one of these quarter-hours of a station: of every limit in force
 * there, and of every exceedance found before, which may have lost its window. Belongs in the transaction that rewrote the
 * quarter-hours.
 */
export async function pendWindowsFor(
  stationId: number,
  quarterStartsSec: readonly number[],
  transaction: Connection,
): Promise<void> {
  const station = await findStationById(stationId, transaction);
  if (!station || quarterStartsSec.length === 0) return;
  const limits = byLimit(await listLimitVersions(station.networkId, transaction));
  if (limits.size === 0) return;
  const timeline = await listSettings(station.networkId, transaction);
  const pending = new Map<string, NewPendingWindow>();
  const add = (window: NewPendingWindow) => pending.set(keyOf(window), window);
  const nowSec = Math.floor(Date.now() / 1000);
  for (const run of runsOf(quarterStartsSec)) {
    for (const [limitId, ofLimit] of limits) {
      const windows = windowsTouched(
        run,
        judgedWindows(ofLimit, stationId, begunAround(run, ofLimit, nowSec), timeline),
        timeline,
      );
      for (const { startSec, endSec } of enoughToJudge(windows, nowSec, timeline))
        add({ limitId, stationId, startSec, endSec });
    }
    const longestSec = LONGEST_EXCEEDANCE_SEC;
    (await selectStandingWindows(stationId, { ...run, longestSec }, transaction)).forEach(add);
  }
  await insertPendingWindows([...(await withoutWaiting(pending, stationId, transaction))], transaction);
}

/** When windows begin that some quarter-hours may change: those that hold them, and, of what is past, those that look back at them. */
function begunAround({ fromSec, toSec }: Span, ofLimit: readonly LimitVersion[], nowSec: number): Span {
  const looksBack = ofLimit.some(hasBackgroundHours);
  return {
    fromSec: fromSec - LONGEST_WINDOW_SEC,
    toSec: looksBack ? Math.max(toSec, Math.min(nowSec, toSec + BACKGROUND_REACH_SEC)) : toSec,
  };
}

function windowsTouched(
  run: Span,
  windows: readonly JudgedWindow[],
  timeline: NetworkSettings[],
): JudgedWindow[] {
  return windows.filter(({ version, startSec, endSec }) => {
    if (startSec < run.toSec && endSec > run.fromSec) return true;
    const hours = backgroundHoursOf(version, startSec, timeline);
    return hours !== null && hours.fromSec < run.toSec && hours.toSec > run.fromSec;
  });
}

/**
 * A window that is still open and waits already need not wait twice: nobody takes it before it has closed. A long window would
 * otherwise gather a row with each post.
 */
async function withoutWaiting(
  pending: Map<string, NewPendingWindow>,
  stationId: number,
  transaction: Connection,
): Promise<Iterable<NewPendingWindow>> {
  const nowSec = Math.floor(Date.now() / 1000);
  if ([...pending.values()].every(({ endSec }) => endSec <= nowSec)) return pending.values();
  for (const waiting of await selectOpenWindows(stationId, nowSec, transaction)) {
    pending.delete(keyOf(waiting));
  }
  return pending.values();
}

/** A window whose end has moved is another one. */
function keyOf({ limitId, startSec, endSec }: NewPendingWindow): string {
  return `${limitId}:${startSec}:${endSec}`;
}

/** Runs of quarter-hours that follow one another. */
function runsOf(quarterStartsSec: readonly number[]): Span[] {
  const runs: Span[] = [];
  for (const startSec of [...new Set(quarterStartsSec)].sort((a, b) => a - b)) {
    const last = runs.at(-1);
    if (last?.toSec === startSec) last.toSec += QUARTER_SEC;
    else runs.push({ fromSec: startSec, toSec: startSec + QUARTER_SEC });
  }
  return runs;
}
