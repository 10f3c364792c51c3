import type { Connection } from '#db/queries/connection';
import { findJudged } from '#db/queries/judgedExceedances';
import type { LimitVersion } from '#db/queries/limits';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import type { PendingWindow } from '#db/queries/pendingWindows';
import { judgedWindows } from '#lib/services/limits/force';
import { judgeWindow, minimumFor } from '#lib/services/limits/measure';
import type { Verdict } from './verdicts';
import type { WindowLevels } from './windowLevels';

/** What a window is judged from. */
export interface Evidence {
  /** Versions of the window's limit, in their order. */
  ofLimit: readonly LimitVersion[];
  /** The network's settings in order of their beginning. */
  timeline: NetworkSettings[];
  levels: WindowLevels;
  /** Windows that end later have not closed yet, epoch seconds. */
  closedBySec: number;
}

/** The verdict on a window; null where there is none yet, or the limit has no such window and found nothing in it before. */
export async function verdictOn(
  window: PendingWindow,
  { ofLimit, timeline, levels, closedBySec }: Evidence,
  transaction: Connection,
): Promise<Verdict | null> {
  const { stationId, startSec } = window;
  const [own] = judgedWindows(ofLimit, stationId, { fromSec: startSec, toSec: startSec + 1 }, timeline);
  if (!own) return lostWindowVerdict(window, ofLimit, transaction);
  // Changed settings may have moved its end: then it waits anew.
  if (own.endSec > closedBySec) return null;
  const { version, endSec } = own;
  const minimumCoverage = minimumFor(version, pickSettings(timeline, startSec));
  const { sums } = await levels.of({ fromSec: startSec, toSec: endSec });
  const judged = judgeWindow(version, { lengthSec: endSec - startSec, minimumCoverage }, sums);
  return {
    version,
    stationId,
    startSec,
    endSec,
    levelDb: judged.levelDb,
    coverage: judged.coverage,
    minimumCoverage,
    isExceeded: judged.isExceeded,
    isWindowLost: false,
  };
}

/** Lifts what was found in a window that the limit, or the network's periods, no longer have: with the figures it had. */
async function lostWindowVerdict(
  { limitId, stationId, startSec }: PendingWindow,
  ofLimit: readonly LimitVersion[],
  transaction: Connection,
): Promise<Verdict | null> {
  const held = await findJudged({ limitId, stationId, startSec }, transaction);
  const version = ofLimit.find(({ id }) => id === held?.limitVersionId);
  if (!held || !version) return null;
  const { endSec, levelDb, coverage } = held;
  return {
    version,
    stationId,
    startSec,
    endSec,
    levelDb,
    coverage,
    minimumCoverage: null,
    isExceeded: false,
    isWindowLost: true,
  };
}
