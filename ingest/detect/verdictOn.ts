import type { Connection } from '#db/queries/connection';
import { findJudged } from '#db/queries/judgedExceedances';
import type { LimitVersion } from '#db/queries/limits';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import type { PendingWindow } from '#db/queries/pendingWindows';
import { judgedWindows, type JudgedWindow } from '#lib/services/limits/force';
import { judgeMeasured, minimumFor } from '#lib/services/limits/measure';
import { rollingVerdicts } from './rollingVerdicts';
import type { Verdict } from './verdicts';
import { runDateOf } from '#lib/services/limits/runs';
import type { WindowEvidence } from '#lib/services/limits/windowEvidence';

/** What a window is judged from. */
export interface Evidence {
  /** Versions of the window's limit, in their order. */
  ofLimit: readonly LimitVersion[];
  /** The network's settings in order of their beginning. */
  timeline: NetworkSettings[];
  measured: WindowEvidence;
  /** Windows that end later have not closed yet, epoch seconds. */
  closedBySec: number;
  /** Dates of rolling limits that were judged in this run already: the judge's own notes. */
  settledDates: Set<string>;
}

/**
 * Verdicts on a window: its own, or those on all that begin on its date where windows roll. None where there is none yet, or the
 * limit has no such window and found nothing in it before.
 */
export async function verdictsOn(
  window: PendingWindow,
  evidence: Evidence,
  transaction: Connection,
): Promise<Verdict[]> {
  const { ofLimit, timeline, closedBySec } = evidence;
  const { stationId, startSec } = window;
  const [own] = judgedWindows(ofLimit, stationId, { fromSec: startSec, toSec: startSec + 1 }, timeline);
  if (!own) return lostWindowVerdict(window, ofLimit, transaction);
  // Changed settings may have moved its end: then it waits anew.
  if (own.endSec > closedBySec) return [];
  if (own.version.stepMin !== null) {
    const date = `${own.version.id}:${runDateOf(own.version, startSec, timeline)}`;
    if (evidence.settledDates.has(date)) return [];
    evidence.settledDates.add(date);
    return rollingVerdicts(own, stationId, evidence, transaction);
  }
  return [await fixedVerdict(own, stationId, evidence)];
}

async function fixedVerdict(
  { version, startSec, endSec }: JudgedWindow,
  stationId: number,
  { timeline, measured }: Evidence,
): Promise<Verdict> {
  const minimumCoverage = minimumFor(version, pickSettings(timeline, startSec));
  const came = await measured.measure(version, { fromSec: startSec, toSec: endSec });
  const judged = judgeMeasured(version, { lengthSec: endSec - startSec, minimumCoverage }, came);
  return {
    version,
    stationId,
    startSec,
    endSec,
    ...FIXED,
    heldStartSec: startSec,
    levelDb: judged.levelDb,
    coverage: judged.coverage,
    minimumCoverage,
    isExceeded: judged.isExceeded,
    isWindowLost: false,
  };
}

const FIXED = { loudest: null, isOngoing: false } as const;

/** Lifts what was found in a window that the limit, or the network's periods, no longer have: with the figures it had. */
async function lostWindowVerdict(
  { limitId, stationId, startSec }: PendingWindow,
  ofLimit: readonly LimitVersion[],
  transaction: Connection,
): Promise<Verdict[]> {
  const held = await findJudged({ limitId, stationId, startSec }, transaction);
  const version = ofLimit.find(({ id }) => id === held?.limitVersionId);
  if (!held || !version) return [];
  const { endSec, levelDb, coverage } = held;
  return [
    {
      version,
      stationId,
      startSec,
      endSec,
      heldStartSec: startSec,
      loudest: held.loudest,
      isOngoing: false,
      levelDb,
      coverage,
      minimumCoverage: null,
      isExceeded: false,
      isWindowLost: true,
    },
  ];
}
